import {
  ChangeDetectionStrategy,
  Component,
  DestroyRef,
  type OnInit,
  computed,
  inject,
  signal,
} from '@angular/core';
import { takeUntilDestroyed } from '@angular/core/rxjs-interop';
import { FormControl, FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { RouterLink } from '@angular/router';
import { type AuditEvent, auditQuerySchema } from '@shared/contracts/audit-contract';
import { firstValueFrom } from 'rxjs';
import { PagedList } from '../../core/paged-list';
import { type Problem, toProblem } from '../../core/problem';
import { valueOf } from '../../core/resource-state';
import { EmptyState } from '../../ui/empty-state/empty-state';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { PageHeader } from '../../ui/page-header/page-header';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { ShowMore } from '../../ui/show-more/show-more';
import { Skeleton } from '../../ui/skeleton/skeleton';
import { StateChip } from '../../ui/state-chip/state-chip';
import { type AuditFilter, SettingsClient } from '../settings-client';
import { detailWords } from './detail-words';

interface Person {
  readonly id: string;
  readonly displayName: string;
}

const text = () => new FormControl('', { nonNullable: true });

/** Who did what to which record, the newest first; looking at it is an event too. */
@Component({
  selector: 'app-audit-page',
  imports: [
    EmptyState,
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    PageHeader,
    ProblemMessage,
    ReactiveFormsModule,
    RouterLink,
    ShowMore,
    Skeleton,
    StateChip,
  ],
  templateUrl: './audit-page.html',
  styleUrls: ['../settings-page.scss', './audit-page.scss'],
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class AuditPage implements OnInit {
  readonly #client = inject(SettingsClient);
  readonly #destroyRef = inject(DestroyRef);
  readonly #refused = signal<Problem | null>(null);
  #filter: AuditFilter = {};

  protected readonly people = signal<readonly Person[]>([]);
  readonly #sites = this.#client.sites();
  protected readonly sites = computed(() => valueOf(this.#sites) ?? []);
  readonly #siteId = signal('');
  /** By whose clock times are shown, and whose days are filtered by. */
  protected readonly site = computed(
    () => this.sites().find(({ id }) => id === this.#siteId()) ?? this.sites()[0],
  );
  protected readonly clock = computed(() => {
    const site = this.site();
    return site ? `the clock of ${site.name}` : Intl.DateTimeFormat().resolvedOptions().timeZone;
  });
  readonly #format = computed(() => {
    const timeZone = this.site()?.timeZone;
    return new Intl.DateTimeFormat('en-US', {
      dateStyle: 'medium',
      timeStyle: 'medium',
      ...(timeZone !== undefined && { timeZone }),
    });
  });
  protected readonly filters = new FormGroup({
    from: text(),
    to: text(),
    actorId: text(),
    recordNumber: text(),
    action: new FormControl('', {
      nonNullable: true,
      validators: (control) =>
        control.value === '' ? null : zodValidator(auditQuerySchema.shape.action)(control),
    }),
  });
  protected readonly list = new PagedList<AuditEvent>(
    (cursor) => this.#client.audit(this.#filter, cursor),
    this.#destroyRef,
  );
  protected readonly problem = computed(() => this.#refused() ?? this.list.problem());
  protected readonly rows = computed(() =>
    this.list.items()?.map((event) => ({
      ...event,
      words: detailWords(event),
      when: this.#format()
        .format(new Date(event.at))
        .replace(/\u202f/g, ' '),
    })),
  );

  ngOnInit(): void {
    this.list.load();
    this.#client
      .users('staff', null)
      .pipe(takeUntilDestroyed(this.#destroyRef))
      .subscribe({
        next: ({ items }) => {
          for (const person of items) this.#offer(person);
        },
        error: (error: unknown) => {
          this.#refused.set(toProblem(error));
        },
      });
  }

  /** Looks the record number up, then lists anew. */
  protected async look(): Promise<void> {
    this.filters.markAllAsTouched();
    const { actorId, action } = this.filters.getRawValue();
    const days = this.#days();
    if (days === null || this.filters.controls.action.invalid) return;
    this.#refused.set(null);
    try {
      const patientId = await this.#patientOf(this.filters.controls.recordNumber.value.trim());
      if (patientId === undefined) return;
      this.#show({
        ...(actorId !== '' && { actorId }),
        ...(patientId !== null && { patientId }),
        ...(action !== '' && { action }),
        ...days,
      });
    } catch (error) {
      this.#refused.set(toProblem(error));
    }
  }

  protected chooseSite(id: string): void {
    this.#siteId.set(id);
  }

  /** The chosen days; null when they run backwards, which is then told at the field. */
  #days(): Pick<AuditFilter, 'siteId' | 'from' | 'to'> | null {
    const { from, to } = this.filters.getRawValue();
    if (from !== '' && to !== '' && from >= to) {
      this.filters.controls.to.setErrors({
        server: 'Choose a day after the first; it is left out',
      });
      return null;
    }
    const site = this.site();
    if (!site || (from === '' && to === '')) return {};
    return { siteId: site.id, ...(from !== '' && { from }), ...(to !== '' && { to }) };
  }

  protected ofPerson(person: Person): void {
    this.#offer(person);
    this.filters.controls.actorId.setValue(person.id);
    this.#show({ ...this.#filter, actorId: person.id });
  }

  protected ofPatient(patient: NonNullable<AuditEvent['patient']>): void {
    this.filters.controls.recordNumber.setValue(patient.recordNumber ?? '');
    this.#show({ ...this.#filter, patientId: patient.id });
  }

  protected showAll(): void {
    this.filters.reset();
    this.#show({});
  }

  #show(filter: AuditFilter): void {
    this.#filter = filter;
    this.list.restart();
  }

  #offer({ id, displayName }: Person): void {
    this.people.update((people) =>
      people.some((one) => one.id === id) ? people : [...people, { id, displayName }],
    );
  }

  /** Null when no number is asked for; undefined when nobody has it, which is then told at the field. */
  async #patientOf(recordNumber: string): Promise<string | null | undefined> {
    if (recordNumber === '') return null;
    const id = await firstValueFrom(this.#client.patientByNumber(recordNumber));
    if (id !== undefined) return id;
    const server =
      'No patient of your sites has this number. You may also choose a number in the list.';
    this.filters.controls.recordNumber.setErrors({ server });
    return undefined;
  }
}
