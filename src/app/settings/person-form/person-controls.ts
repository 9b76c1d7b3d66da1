import { FormControl, FormGroup } from '@angular/forms';
import { type Role, type User, newUserSchema } from '@shared/contracts/accounts-contract';
import { zodValidator } from '../../ui/field-error/zod-validator';

const rules = newUserSchema.shape;

const textControl = (value: string, schema: Parameters<typeof zodValidator>[0]) =>
  new FormControl(value, { nonNullable: true, validators: zodValidator(schema) });

const markControl = (value: boolean) => new FormControl(value, { nonNullable: true });

/** What an administrator decides of an account; the roles are those of staff alone. */
export function personControls(user?: User) {
  const roles = (user?.roles ?? []).filter((role): role is StaffRole => role !== 'patient');
  const patientAlone = user !== undefined && roles.length === 0 && user.roles.includes('patient');
  return new FormGroup({
    displayName: textControl(user?.displayName ?? '', rules.displayName),
    roles: new FormControl<readonly StaffRole[]>(roles, {
      nonNullable: true,
      validators: patientAlone ? [] : zodValidator(rules.roles),
    }),
    siteIds: new FormControl<readonly string[]>(user?.siteIds ?? [], { nonNullable: true }),
    medicalDirector: markControl(user?.medicalDirector ?? false),
    student: markControl(user?.student ?? false),
  });
}

export type StaffRole = Exclude<Role, 'patient'>;
export type PersonControls = ReturnType<typeof personControls>;

export const emailControl = () => textControl('', rules.email);

/** The list with one more or one fewer of its values. */
export function toggled<T>(values: readonly T[], value: T): readonly T[] {
  return values.includes(value) ? values.filter((each) => each !== value) : [...values, value];
}
