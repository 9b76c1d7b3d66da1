import type { ErrorCode, FieldError } from '@shared/errors';
import type { AuditEntry } from '../audit/audit-service';

export interface FailureDetails {
  /** Takes the place of the code's usual title where more can be said. */
  readonly title?: string;
  readonly errors?: readonly FieldError[];
  /** Sent as Retry-After. */
  readonly retryAfterSeconds?: number;
  /** Further members of the problem document, as what a date of a series failed on. */
  readonly more?: Readonly<Record<string, unknown>>;
  /** Written to the audit although the transaction is rolled back. */
  readonly record?: AuditEntry;
}

/** An outcome that was to be expected and is no success: returned, or thrown from deep inside; both roll back. */
export class Failure extends Error {
  override readonly name = 'Failure';

  constructor(
    readonly code: ErrorCode,
    readonly details: FailureDetails = {},
  ) {
    super(code);
  }
}

/** @example return fail('stale-version'); */
export const fail = (code: ErrorCode, details?: FailureDetails): Failure =>
  new Failure(code, details);
