import { ChangeDetectionStrategy, Component, computed, input } from '@angular/core';
import { toObservable, toSignal } from '@angular/core/rxjs-interop';
import type { AbstractControl, FormControl } from '@angular/forms';
import { ReactiveFormsModule } from '@angular/forms';
import { MatError, MatFormField, MatHint, MatLabel, MatSuffix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { switchMap } from 'rxjs';
import { FieldError } from '../../ui/field-error/field-error';
import { NumberInput } from '../../ui/number-input/number-input';
import type { FieldSpec } from '../rests-on/field-specs';

const yesAndNo = [
  { value: true, label: 'Yes' },
  { value: false, label: 'No' },
];

/** One field of the request. */
@Component({
  selector: 'app-input-field',
  imports: [
    FieldError,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    MatSuffix,
    NumberInput,
    ReactiveFormsModule,
  ],
  templateUrl: './input-field.html',
  styleUrl: './input-field.scss',
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class InputField {
  readonly spec = input.required<FieldSpec>();
  /** The form or group in which the field's path begins. */
  readonly group = input.required<AbstractControl>();

  protected readonly control = computed(
    () => this.group().get(this.spec().path) as FormControl<string | null>,
  );
  protected readonly unit = computed(() => {
    const field = this.spec();
    return field.kind === 'number' ? field.unit : '';
  });
  protected readonly hint = computed(() => {
    const field = this.spec();
    return field.kind === 'number' ? (field.hint ?? '') : '';
  });
  protected readonly options = computed(() => {
    const field = this.spec();
    return field.kind === 'choice' ? field.options : yesAndNo;
  });
  /** What becomes of the control elsewhere, as by another field's value, shows here too. */
  readonly #happened = toSignal(
    toObservable(this.control).pipe(switchMap((control) => control.events)),
  );
  protected readonly atFault = computed(() => {
    this.#happened();
    return this.control().invalid;
  });
  protected readonly empty = computed(() => {
    this.#happened();
    return this.control().value === null;
  });
}
