import type { AbstractControl, ValidatorFn } from '@angular/forms';
import type * as z from 'zod';

/** What a control's errors hold when a contract's rule or the server refused its value. */
interface FieldErrors {
  rule?: string;
  server?: string;
}

/** Checks a control by a contract's schema; the message is the schema's own. */
export function zodValidator(schema: z.ZodType): ValidatorFn {
  return (control) => {
    const result = schema.safeParse(control.value);
    if (result.success) return null;
    return { rule: result.error.issues[0]?.message ?? 'Check this value' } satisfies FieldErrors;
  };
}

/** What to tell beside the field, null when its value stands. */
export function fieldErrorOf(control: AbstractControl): string | null {
  const errors = control.errors as FieldErrors | null;
  return errors?.server ?? errors?.rule ?? null;
}

/**
 * Puts the server's field errors beside their fields; each goes when its value changes.
 * @param form the form whose shape the request has
 * @returns those errors that name no control of the form, to be shown with the problem
 */
export function showFieldErrors<E extends { path: string; message: string }>(
  form: AbstractControl,
  errors: readonly E[],
): E[] {
  return errors.filter(({ path, message }) => {
    const control = path === '' ? null : form.get(path);
    if (control === null) return true;
    control.setErrors({ ...control.errors, server: message } satisfies FieldErrors);
    control.markAsTouched();
    return false;
  });
}
