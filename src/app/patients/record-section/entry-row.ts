import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  Injector,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { FormControl, ReactiveFormsModule } from '@angular/forms';
import { MatButton, MatIconButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  type RecordEntry,
  retireThresholdRequestSchema,
  stopMedicationRequestSchema,
} from '@shared/contracts/record-contract';
import { FieldError } from '../../ui/field-error/field-error';
import { zodValidator } from '../../ui/field-error/zod-validator';
import { Icon } from '../../ui/icon/icon';
import { StateChip } from '../../ui/state-chip/state-chip';
import { formatDay, formatLocalDate } from '../../ui/words/dates';
import { PatientAccess } from '../patient-access';
import { entryWords } from './entry-words';
import type { ListedKind } from './section-words';

/** What is asked before an action: a stop's date, a reason, or no more than yes. */
type Asked = 'in-error' | 'stop' | 'retire';

/** One entry: what, of when, by whom, and what may be done with it. */
@Component({
  selector: 'app-entry-row',
  imports: [
    FieldError,
    Icon,
    MatButton,
    MatError,
    MatFormField,
    MatIconButton,
    MatInput,
    MatLabel,
    ReactiveFormsModule,
    StateChip,
  ],
  templateUrl: './entry-row.html',
  styleUrl: './entry-row.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntryRow {
  readonly #element = inject<ElementRef<HTMLElement>>(ElementRef);
  readonly #injector = inject(Injector);
  protected readonly access = inject(PatientAccess);

  readonly kind = input.required<ListedKind>();
  readonly entry = input.required<RecordEntry>();
  readonly today = input.required<string>();
  readonly timeZone = input.required<string>();
  readonly changed = output();
  readonly inError = output();
  readonly stopped = output<string>();
  readonly retired = output<string>();

  /** Whether the actions are shown. */
  protected readonly open = signal(false);
  protected readonly asked = signal<Asked | null>(null);
  protected readonly stoppedOn = new FormControl('', {
    nonNullable: true,
    validators: zodValidator(stopMedicationRequestSchema.shape.stoppedOn),
  });
  protected readonly reason = new FormControl('', {
    nonNullable: true,
    validators: zodValidator(retireThresholdRequestSchema.shape.reason),
  });

  protected readonly words = computed(() => entryWords(this.kind(), this.entry().values as never));
  protected readonly isWrong = computed(() => this.entry().enteredInErrorAt !== null);
  protected readonly isStopped = computed(() =>
    Boolean((this.entry().values as { stoppedOn?: string | null }).stoppedOn),
  );
  protected readonly binds = computed(
    () => this.kind() === 'thresholds' && this.entry().ended === null && !this.isWrong(),
  );
  protected readonly mayChange = computed(
    () => this.binds() || (this.kind() === 'medications' && !this.isStopped()),
  );
  protected readonly source = computed(() => {
    const { recordedAt, recordedBy } = this.entry();
    const { date } = this.words();
    const recordedOn = formatDay(recordedAt, this.timeZone());
    const by = `entered by ${recordedBy.displayName}`;
    if (date === null) return `${recordedOn} · ${by}`;
    const dated = formatLocalDate(date);
    return dated === recordedOn ? `${dated} · ${by}` : `${dated} · ${by} on ${recordedOn}`;
  });
  protected readonly day = (instant: string) => formatDay(instant, this.timeZone());

  protected toggle(): void {
    this.asked.set(null);
    this.open.update((open) => !open);
  }

  protected startChange(): void {
    this.open.set(false);
    this.changed.emit();
  }

  /** Leaves everything as it is, with the focus where it was opened. */
  protected keep(): void {
    this.asked.set(null);
    this.open.set(false);
    this.#element.nativeElement.querySelector<HTMLElement>('[aria-expanded]')?.focus();
  }

  protected ask(what: Asked): void {
    this.stoppedOn.reset(this.today());
    this.reason.reset('');
    this.asked.set(what);
    afterNextRender(
      () =>
        this.#element.nativeElement
          .querySelector<HTMLElement>('.asked :is(input, button)')
          ?.focus(),
      { injector: this.#injector },
    );
  }

  protected answer(): void {
    const asked = this.asked();
    const control = asked === 'stop' ? this.stoppedOn : asked === 'retire' ? this.reason : null;
    control?.markAsTouched();
    if (control?.invalid) return;
    this.asked.set(null);
    this.open.set(false);
    if (asked === 'stop') this.stopped.emit(this.stoppedOn.value);
    else if (asked === 'retire') this.retired.emit(this.reason.value);
    else this.inError.emit();
  }
}
