import type * as z from 'zod';
import type { FieldError } from '../errors';

const pathOf = (keys: readonly PropertyKey[]): string => keys.map(String).join('.');

function errorsOf(issue: z.core.$ZodIssue): FieldError[] {
  if (issue.code !== 'unrecognized_keys') {
    return [{ path: pathOf(issue.path), code: issue.code, message: issue.message }];
  }
  return issue.keys.map((key) => ({
    path: pathOf([...issue.path, key]),
    code: issue.code,
    message: 'This field is not known: leave it out.',
  }));
}

/** The faults of a parse, one a field, in the order of the fields: a field's first fault is the one to mend. */
export function fieldErrors(error: z.core.$ZodError): FieldError[] {
  const firstByPath = new Map<string, FieldError>();
  for (const fault of error.issues.flatMap(errorsOf)) {
    if (!firstByPath.has(fault.path)) firstByPath.set(fault.path, fault);
  }
  return [...firstByPath.values()];
}
