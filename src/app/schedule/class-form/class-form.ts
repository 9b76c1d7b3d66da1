import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  signal,
} from '@angular/core';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatHint, MatLabel } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import {
  type ClassTemplate,
  type ClassTemplates,
  type SavedClassTemplate,
  newClassTemplateSchema,
} from '@shared/contracts/class-templates-contract';
import type { ClassKind } from '@shared/contracts/schedule-contract';
import { weekdaysOfRule, weeklyRule } from '@shared/scheduling/weekly-rule';
import { formatMoney } from '@shared/units/money';
import { type Problem, toProblem } from '../../core/problem';
import { FieldError } from '../../ui/field-error/field-error';
import { showFieldErrors, zodValidator } from '../../ui/field-error/zod-validator';
import { ProblemMessage } from '../../ui/problem-message/problem-message';
import { kindWords } from '../class-words';
import { ScheduleClient } from '../schedule-client';
import { weekdays } from '../weeks';

const rules = newClassTemplateSchema.shape;

/** Adds a class or changes one. */
@Component({
  selector: 'app-class-form',
  imports: [
    FieldError,
    MatButton,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    ProblemMessage,
    ReactiveFormsModule,
  ],
  templateUrl: './class-form.html',
  styleUrl: './class-form.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class ClassForm {
  readonly #client = inject(ScheduleClient);

  /** Null adds one. */
  readonly template = input.required<ClassTemplate | null>();
  readonly siteId = input.required<string>();
  readonly today = input.required<string>();
  readonly prices = input.required<ClassTemplates['prices']>();
  readonly saved = output<SavedClassTemplate>();
  readonly closed = output();

  protected readonly kinds = Object.entries(kindWords);
  protected readonly weekdays = weekdays;
  protected readonly priceChoices = computed(() =>
    this.prices().map(({ id, name, amountMinor, currency }) => ({
      id,
      words: `${name}, ${formatMoney(amountMinor, currency)}`,
    })),
  );
  protected readonly form = inject(NonNullableFormBuilder).group({
    name: ['', zodValidator(rules.name)],
    kind: ['exercise' as ClassKind, zodValidator(rules.kind)],
    recurrence: [weeklyRule([1, 3, 5]), zodValidator(rules.recurrence)],
    localStart: ['09:00', zodValidator(rules.localStart)],
    durationMinutes: [60, zodValidator(rules.durationMinutes)],
    capacity: [12, zodValidator(rules.capacity)],
    monitoredPlaces: [12, zodValidator(rules.monitoredPlaces)],
    startsOn: ['', zodValidator(rules.startsOn)],
    endsOn: [''],
    priceItemId: [''],
  });
  readonly #rule = signal(this.form.controls.recurrence.value);
  /** The weekdays of the rule; null for a rule that is more than weekdays, which is then typed. */
  protected readonly days = computed(() => weekdaysOfRule(this.#rule()));
  protected readonly sending = signal(false);
  protected readonly problem = signal<Problem | null>(null);

  constructor() {
    this.form.controls.recurrence.valueChanges.subscribe((rule) => this.#rule.set(rule));
    effect(() => {
      const template = this.template();
      this.problem.set(null);
      this.form.reset({
        ...(template ?? { startsOn: this.today() }),
        endsOn: template?.endsOn ?? '',
        priceItemId: template?.priceItemId ?? '',
      });
    });
  }

  protected toggle(day: number): void {
    const days = this.days() ?? [];
    const next = days.includes(day) ? days.filter((one) => one !== day) : [...days, day];
    // The last day stays: a class without days is none, and would leave no box to tick.
    if (next.length > 0) this.form.controls.recurrence.setValue(weeklyRule(next));
  }

  protected async save(): Promise<void> {
    this.form.markAllAsTouched();
    if (this.form.invalid || this.sending()) return;
    this.sending.set(true);
    this.problem.set(null);
    try {
      this.saved.emit(await this.#send());
    } catch (error) {
      const problem = toProblem(error);
      showFieldErrors(this.form, problem.errors);
      this.problem.set(problem);
    } finally {
      this.sending.set(false);
    }
  }

  #send(): Promise<SavedClassTemplate> {
    const { endsOn, priceItemId, ...given } = this.form.getRawValue();
    const fields = { ...given, endsOn: endsOn || null, priceItemId: priceItemId || null };
    const template = this.template();
    return template === null
      ? this.#client.addClass({ ...fields, siteId: this.siteId() })
      : this.#client.changeClass(template, { ...fields, version: template.version });
  }
}
