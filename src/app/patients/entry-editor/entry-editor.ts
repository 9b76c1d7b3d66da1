import {
  ChangeDetectionStrategy,
  Component,
  ElementRef,
  afterNextRender,
  computed,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { takeUntilDestroyed, toObservable, toSignal } from '@angular/core/rxjs-interop';
import { type FormGroup, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { recordValues } from '@shared/contracts/record-contract';
import type { FieldError } from '@shared/errors';
import {
  EMPTY,
  type Observable,
  distinctUntilChanged,
  map,
  merge,
  startWith,
  switchMap,
  tap,
} from 'rxjs';
import { v7 as uuidv7 } from 'uuid';
import { type Problem, toProblem } from '../../core/problem';
import { showFieldErrors } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { EntryField } from '../entry-field/entry-field';
import { PatientChart } from '../patient-chart';
import type { EntryForm } from './entry-form';
import { ComputedLines } from '../computed-lines/computed-lines';
import { askAgain, buildGroup, fillField, readGroup, unitKey } from './entry-group';
import { UnitMemory } from './unit-memory';

type Entries = ReturnType<EntryForm['toEntries']>;

const inRequest = /^entries\.(\d+)\.values\.(.*)$/;

/** The form of an entry: nothing typed is lost on an error, Escape leaves, sending twice enters once. */
@Component({
  selector: 'app-entry-editor',
  imports: [ComputedLines, EntryField, MatButton, ProblemMessage, ReactiveFormsModule],
  templateUrl: './entry-editor.html',
  styleUrl: './entry-editor.scss',
  host: { '(keydown.escape)': 'cancel($event)' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntryEditor {
  readonly #chart = inject(PatientChart);
  readonly #units = inject(UnitMemory);
  readonly #element = inject<ElementRef<HTMLElement>>(ElementRef);
  readonly #ids: string[] = [];

  readonly form = input.required<EntryForm>();
  /** The site's date, with which dates begin. */
  readonly today = input.required<string>();
  readonly closed = output();

  protected readonly context = computed(() => ({
    today: this.today(),
    units: this.#units.read(),
  }));
  protected readonly group = computed(() => {
    const { fields, rules, initial = {} } = this.form();
    return buildGroup(fields, rules, initial, this.context());
  });
  /** Counts what is typed, so that what is computed from it follows. */
  readonly #typed = toSignal(
    toObservable(this.group).pipe(
      switchMap((group) => group.valueChanges.pipe(startWith(null))),
      map((_, count) => count),
    ),
  );
  protected readonly lines = computed(() => {
    this.#typed();
    const { fields, lines } = this.form();
    return lines?.(readGroup(fields, this.group())) ?? [];
  });
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  constructor() {
    afterNextRender(() => this.#focus('input, select, textarea'));
    toObservable(this.group)
      .pipe(
        switchMap((group) => merge(...this.#filling(group))),
        takeUntilDestroyed(),
      )
      .subscribe();
  }

  /** For each field that fills others: what it fills, whenever another value is chosen in it. */
  #filling(group: FormGroup): Observable<unknown>[] {
    const { fills = {}, fields } = this.form();
    return Object.entries(fills).map(([key, fill]) => {
      const changes: Observable<unknown> = group.get([key])?.valueChanges ?? EMPTY;
      return changes.pipe(
        distinctUntilChanged(),
        tap(() => {
          for (const [filled, value] of Object.entries(fill(readGroup(fields, group)))) {
            const field = fields.find((each) => each.key === filled);
            if (field) fillField(group, field, value, this.context());
          }
        }),
      );
    });
  }

  protected cancel(event: Event): void {
    event.preventDefault();
    if (!this.sending()) this.closed.emit();
  }

  protected async save(): Promise<void> {
    if (this.sending()) return;
    const group = this.group();
    askAgain(group);
    const entries = this.form().toEntries(readGroup(this.form().fields, group), this.#idOf);
    if (group.valid) this.#checkTogether(entries, group);
    group.markAllAsTouched();
    if (group.invalid) return this.#focus('.ng-invalid:is(input, select, textarea)');
    if (entries.length === 0) return this.closed.emit();
    await this.#send(entries, group);
  }

  readonly #idOf = (index: number): string => (this.#ids[index] ??= uuidv7());

  /** Rules that look at several fields, as the server will. */
  #checkTogether(entries: Entries, group: FormGroup): void {
    for (const [index, { kind, values }] of entries.entries()) {
      const { error } = recordValues[kind].safeParse(values);
      const faults = (error?.issues ?? []).map(({ path, message }) => ({
        path: this.form().pathOf(index) + path.join('.'),
        message,
      }));
      showFieldErrors(group, faults);
    }
  }

  async #send(entries: Entries, group: FormGroup): Promise<void> {
    this.sending.set(true);
    this.problem.set(null);
    try {
      await this.#chart.add(entries, this.form().saved);
      this.#keepUnits(group);
      this.closed.emit();
    } catch (error) {
      this.#tell(toProblem(error), group);
    } finally {
      this.sending.set(false);
    }
  }

  #tell(problem: Problem, group: FormGroup): void {
    const rest = showFieldErrors(
      group,
      problem.errors.map((fault) => this.#inForm(fault)),
    );
    if (rest.length > 0 || problem.errors.length === 0) this.problem.set(problem);
    else this.#focus('.ng-invalid:is(input, select, textarea)');
  }

  #inForm(fault: FieldError): FieldError {
    const [, index, key] = inRequest.exec(fault.path) ?? [];
    if (index === undefined || key === undefined) return fault;
    return { ...fault, path: this.form().pathOf(Number(index)) + key };
  }

  #keepUnits(group: FormGroup): void {
    const chosen = this.form().fields.flatMap(({ key }) => {
      const unit: unknown = group.get([unitKey(key)])?.value;
      return typeof unit === 'string' ? [[key, unit]] : [];
    });
    this.#units.keep(Object.fromEntries(chosen) as Record<string, string>);
  }

  #focus(selector: string): void {
    this.#element.nativeElement.querySelector<HTMLElement>(selector)?.focus();
  }
}
