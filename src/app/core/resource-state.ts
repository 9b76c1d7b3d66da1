import type { Resource } from '@angular/core';
import { type Problem, toProblem } from './problem';

/** What a resource holds, undefined while it loads for the first time or has failed. */
export const valueOf = <T>(resource: Resource<T | undefined>): T | undefined =>
  resource.hasValue() ? resource.value() : undefined;

/** Why it failed, null when it did not. */
export function failureOf(resource: Resource<unknown>): Problem | null {
  const error = resource.error();
  if (error === undefined) return null;
  // A resource wraps what was thrown when it is no Error; ours is one, and stands as it is or as its cause.
  return toProblem(error.cause ?? error);
}
