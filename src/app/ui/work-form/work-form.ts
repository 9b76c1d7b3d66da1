import {
  ChangeDetectionStrategy,
  Component,
  computed,
  effect,
  inject,
  input,
  output,
  signal,
  untracked,
} from '@angular/core';
import { toSignal } from '@angular/core/rxjs-interop';
import { NonNullableFormBuilder, ReactiveFormsModule } from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatError, MatFormField, MatLabel, MatSuffix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import type { MachineSetting } from '@shared/clinical/progression/machine-setting';
import {
  type BoutRequest,
  bounds,
  machineSettingSchema,
} from '@shared/contracts/progression-contract';
import { NumberInput } from '../number-input/number-input';
import { machineWords } from '../words/load-words';

export type Work = Pick<BoutRequest, 'setting' | 'minutes'>;
type Modality = MachineSetting['modality'];
type Field = Exclude<keyof typeof bounds, 'minutes'>;

const fieldsOf: Readonly<Record<Modality, readonly Field[]>> = {
  'treadmill-walk': ['speedMph', 'gradePercent'],
  'treadmill-run': ['speedMph', 'gradePercent'],
  cycle: ['powerWatts'],
  arm: ['powerWatts'],
  step: ['stepHeightMeters', 'stepsPerMinute'],
  stepper: ['mets'],
};

/** A step's height is entered in centimeters. */
const shown: Readonly<Record<Field | 'minutes', { label: string; unit: string; factor: number }>> =
  {
    speedMph: { label: 'Speed', unit: 'mph', factor: 1 },
    gradePercent: { label: 'Grade', unit: '%', factor: 1 },
    powerWatts: { label: 'Power', unit: 'W', factor: 1 },
    stepHeightMeters: { label: 'Step height', unit: 'cm', factor: 100 },
    stepsPerMinute: { label: 'Steps a minute', unit: '', factor: 1 },
    mets: { label: 'Shown work', unit: 'METs', factor: 1 },
    minutes: { label: 'Minutes', unit: 'min', factor: 1 },
  };

const isNumber = (value: number | string | null): value is number => typeof value === 'number';

function isWithin(field: keyof typeof bounds, value: number | string | null): boolean {
  return isNumber(value) && value >= bounds[field].lowest && value <= bounds[field].highest;
}

function faultOf(field: keyof typeof bounds): string {
  const { label, unit, factor } = shown[field];
  const { lowest, highest } = bounds[field];
  return `${label}: enter ${lowest * factor} to ${highest * factor}${unit && ` ${unit}`}`;
}

/** How a machine is set and for how long, as one types it. */
@Component({
  selector: 'app-work-form',
  imports: [
    MatButton,
    MatError,
    MatFormField,
    MatInput,
    MatLabel,
    MatSuffix,
    NumberInput,
    ReactiveFormsModule,
  ],
  template: `
    <form [formGroup]="form" (ngSubmit)="send()">
      <mat-form-field subscriptSizing="dynamic" class="machine">
        <mat-label>Machine</mat-label>
        <select matNativeControl formControlName="modality">
          @for (one of machines; track one.value) {
            <option [value]="one.value">{{ one.words }}</option>
          }
        </select>
      </mat-form-field>
      @for (field of fields(); track field.name) {
        <mat-form-field subscriptSizing="dynamic">
          <mat-label>{{ field.label }}</mat-label>
          <input matInput appNumber [factor]="field.factor" [formControlName]="field.name" />
          <span matSuffix class="unit">{{ field.unit }}</span>
        </mat-form-field>
      }
      <ng-content />
      <button matButton="outlined" type="submit" [disabled]="busy()" disabledInteractive>
        {{ action() }}
      </button>
      @if (fault(); as words) {
        <mat-error role="alert">{{ words }}</mat-error>
      }
    </form>
  `,
  styles: `
    form {
      display: grid;
      grid-template-columns: repeat(auto-fit, minmax(8rem, 1fr));
      gap: 0.5rem;
      align-items: center;
    }
    .machine,
    mat-error {
      grid-column: 1 / -1;
    }
    .unit {
      padding-right: 0.75rem;
      color: var(--muted);
    }
  `,
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class WorkForm {
  /** What it begins with. */
  readonly start = input<Work | null>(null);
  readonly action = input.required<string>();
  readonly busy = input(false);
  readonly sent = output<Work>();

  protected readonly machines = Object.entries(machineWords).map(([value, words]) => ({
    value,
    words,
  }));
  readonly #builder = inject(NonNullableFormBuilder);
  readonly #number = () => this.#builder.control<number | string | null>(null);
  protected readonly form = this.#builder.group({
    modality: this.#builder.control<Modality>('treadmill-walk'),
    speedMph: this.#number(),
    gradePercent: this.#number(),
    powerWatts: this.#number(),
    stepHeightMeters: this.#number(),
    stepsPerMinute: this.#number(),
    mets: this.#number(),
    minutes: this.#number(),
  });
  readonly #value = toSignal(this.form.valueChanges, { initialValue: this.form.value });
  protected readonly fields = computed(() =>
    [...fieldsOf[this.#value().modality ?? 'treadmill-walk'], 'minutes' as const].map((name) => ({
      name,
      ...shown[name],
    })),
  );
  protected readonly fault = signal<string | null>(null);

  constructor() {
    effect(() => {
      const start = this.start();
      if (start)
        untracked(() => this.form.patchValue({ ...start.setting, minutes: start.minutes }));
    });
  }

  protected send(): void {
    const { modality, minutes, ...all } = this.form.getRawValue();
    const wrong = fieldsOf[modality].find((name) => !isWithin(name, all[name]));
    if (wrong) return this.fault.set(faultOf(wrong));
    if (minutes !== null && !isWithin('minutes', minutes))
      return this.fault.set(faultOf('minutes'));
    this.fault.set(null);
    const values = fieldsOf[modality].map((name) => [name, all[name]] as const);
    const setting = machineSettingSchema.parse({ modality, ...Object.fromEntries(values) });
    this.sent.emit({ setting, minutes: isNumber(minutes) ? minutes : null });
  }
}
