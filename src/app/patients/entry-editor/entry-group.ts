import {
  type AbstractControl,
  FormArray,
  FormControl,
  FormGroup,
  type ValidatorFn,
} from '@angular/forms';
import { zodValidator } from '../../ui/field-error/zod-validator';
import type { EntryField, Rules, Values } from './entry-form';
import type { Unit } from './units';

/** Where the unit of a number stands beside it. */
export const unitKey = (key: string): string => `${key} unit`;

/** Which unit each field was last typed in, by key; the first of the field's when it never was. */
export type UnitNames = Readonly<Record<string, string>>;

function unitOf(field: Extract<EntryField, { type: 'number' }>, name: unknown): Unit {
  return field.units.find((unit) => unit.name === name) ?? field.units[0];
}

/** The contract's value of what a control holds. */
function readControl(field: EntryField, control: AbstractControl): unknown {
  const raw: unknown = control.value;
  switch (field.type) {
    case 'number': {
      const name: unknown = control.parent?.get([unitKey(field.key)])?.value;
      return unitOf(field, name).read(String(raw));
    }
    case 'rows':
      return (control as FormArray<FormGroup>).controls.map((row) => readGroup(field.fields, row));
    case 'check':
    case 'marks':
    case 'items':
      return raw;
    case 'yes-no':
      return raw === '' ? null : raw === 'yes';
    case 'note':
      return String(raw).trim() === '' ? null : raw;
    case 'choice':
    case 'date':
      return raw === '' ? null : raw;
    case 'text':
      return field.optional && String(raw).trim() === '' ? null : raw;
  }
}

/** All values of a form, by the keys of the contract. */
export function readGroup(fields: readonly EntryField[], group: FormGroup): Values {
  return Object.fromEntries(
    fields.flatMap((field) => {
      const control = group.get([field.key]);
      return control ? [[field.key, readControl(field, control)]] : [];
    }),
  );
}

function validatorOf(field: EntryField, rule: Rules[string] | undefined): ValidatorFn[] {
  if (!rule) return [];
  const check = zodValidator(rule);
  return [(control) => check(new FormControl(readControl(field, control)))];
}

function textOf(field: EntryField, value: unknown, unit: Unit | null, today: string): unknown {
  if (field.type === 'check') return value === true;
  if (field.type === 'marks') return value ?? [];
  if (field.type === 'items') return value ?? field.items.map(() => null);
  if (field.type === 'yes-no') return value === true ? 'yes' : value === false ? 'no' : '';
  if (value === null || value === undefined)
    return field.type === 'date' && value === undefined ? today : '';
  if (typeof value === 'number') return unit ? unit.write(value) : String(value);
  return typeof value === 'string' ? value : '';
}

/** Builds the controls of one field: the value, and its unit where there is a choice. */
function addField(
  group: FormGroup,
  field: EntryField,
  rules: Rules,
  initial: Values,
  { today, units }: FormContext,
): void {
  const validators = validatorOf(field, rules[field.key]);
  if (field.type === 'rows') {
    const rows = (initial[field.key] as Values[] | undefined) ?? [];
    const array = new FormArray(
      rows.map((row) => buildGroup(field.fields, field.rules, row, { today, units })),
    );
    group.addControl(field.key, array);
    return;
  }
  const unit = field.type === 'number' ? unitOf(field, units[field.key]) : null;
  const text = textOf(field, initial[field.key], unit, today);
  const control = new FormControl(text, { nonNullable: true });
  group.addControl(field.key, control);
  if (unit) group.addControl(unitKey(field.key), new FormControl(unit.name, { nonNullable: true }));
  control.addValidators(validators);
  control.updateValueAndValidity();
}

/** Puts a value into a field that is built already; rows are made anew. */
export function fillField(
  group: FormGroup,
  field: EntryField,
  value: unknown,
  context: FormContext,
): void {
  const control = group.get([field.key]);
  if (field.type === 'rows') {
    const array = control as FormArray<FormGroup>;
    array.clear();
    for (const row of value as Values[]) {
      array.push(buildGroup(field.fields, field.rules, row, context));
    }
    return;
  }
  const name: unknown = group.get([unitKey(field.key)])?.value;
  const unit = field.type === 'number' ? unitOf(field, name) : null;
  control?.setValue(textOf(field, value, unit, context.today));
}

export interface FormContext {
  /** What dates begin with. */
  readonly today: string;
  readonly units: UnitNames;
}

/** The controls of a form, each held against its rule, with what stands in them to begin with. */
export function buildGroup(
  fields: readonly EntryField[],
  rules: Rules,
  initial: Values,
  context: FormContext,
): FormGroup {
  const group = new FormGroup<Record<string, AbstractControl>>({});
  for (const field of fields) addField(group, field, rules, initial, context);
  return group;
}

/** Asks every rule again, and with it drops what the last try was refused for. */
export function askAgain(control: AbstractControl): void {
  const inner = (control as Partial<FormGroup>).controls ?? {};
  for (const each of Object.values(inner)) askAgain(each);
  control.updateValueAndValidity({ emitEvent: true });
}
