import { ChangeDetectionStrategy, Component, computed, input, signal } from '@angular/core';
import {
  type FormArray,
  type FormControl,
  type FormGroup,
  ReactiveFormsModule,
} from '@angular/forms';
import { MatButton } from '@angular/material/button';
import { MatCheckbox } from '@angular/material/checkbox';
import { MatError, MatFormField, MatHint, MatLabel, MatSuffix } from '@angular/material/form-field';
import { MatInput } from '@angular/material/input';
import { FieldError } from '../../ui/field-error/field-error';
import { Icon } from '../../ui/icon/icon';
import { EntryGrid } from '../entry-grid/entry-grid';
import { type FormContext, buildGroup, unitKey } from '../entry-editor/entry-group';
import type { EntryField as Field } from '../entry-editor/entry-form';

/** One field of an entry's form, with its unit beside and its error below; rows hold fields of their own. */
@Component({
  selector: 'app-entry-field',
  imports: [
    EntryGrid,
    FieldError,
    Icon,
    MatButton,
    MatCheckbox,
    MatError,
    MatFormField,
    MatHint,
    MatInput,
    MatLabel,
    MatSuffix,
    ReactiveFormsModule,
  ],
  templateUrl: './entry-field.html',
  styleUrl: './entry-field.scss',
  host: { '[class]': 'field().type' },
  changeDetection: ChangeDetectionStrategy.OnPush,
})
export class EntryField {
  readonly field = input.required<Field>();
  readonly group = input.required<FormGroup>();
  readonly context = input.required<FormContext>();

  protected readonly control = computed(
    () => this.group().get([this.field().key]) as FormControl<string>,
  );
  protected readonly unit = computed(
    () => this.group().get([unitKey(this.field().key)]) as FormControl<string> | null,
  );
  protected readonly rows = computed(
    () => this.group().get([this.field().key]) as FormArray<FormGroup>,
  );

  /** What was typed means another number now: its rule is asked again, nothing typed changes. */
  protected unitChanged(): void {
    this.control().updateValueAndValidity();
  }

  protected addRow(): void {
    const field = this.field();
    if (field.type !== 'rows') return;
    this.rows().push(buildGroup(field.fields, field.rules, {}, this.context()));
  }

  protected readonly suggestions = computed(() => {
    const field = this.field();
    return field.type === 'text' && field.suggest ? field.suggest : null;
  });
  protected readonly listId = computed(() => `suggest-${this.field().key}`);
  protected readonly suggested = signal<readonly string[]>([]);

  protected typed(event: Event): void {
    const text = (event.target as HTMLInputElement).value;
    this.suggested.set(this.suggestions()?.(text) ?? []);
  }

  protected isMarked(value: string): boolean {
    return (this.control().value as unknown as string[]).includes(value);
  }

  protected mark(value: string, marked: boolean): void {
    const control = this.control() as unknown as FormControl<string[]>;
    const others = control.value.filter((each) => each !== value);
    control.setValue(marked ? [...others, value] : others);
  }

  protected answerAt(index: number): unknown {
    return (this.control().value as unknown as unknown[])[index] ?? null;
  }

  protected answer(index: number, value: number | boolean): void {
    const control = this.control() as unknown as FormControl<unknown[]>;
    control.setValue(control.value.map((each, at) => (at === index ? value : each)));
  }

  protected removeRow(index: number): void {
    this.rows().removeAt(index);
  }
}
