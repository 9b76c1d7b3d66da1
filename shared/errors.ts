/** Every code that a failure may carry, with its HTTP status; the list is closed. */
export const errorStatus = {
  'unreadable-body': 400,
  unauthenticated: 401,
  'wrong-credentials': 401,
  csrf: 403,
  forbidden: 403,
  'not-found': 404,
  'method-not-allowed': 405,
  'already-recorded': 409,
  'already-signed': 409,
  'class-closed': 409,
  'class-full': 409,
  'course-complete': 409,
  'daily-limit': 409,
  'idempotency-key-reused': 409,
  'illegal-transition': 409,
  'monitors-full': 409,
  'no-active-enrollment': 409,
  'not-checked-in': 409,
  'overlapping-appointment': 409,
  'record-signed': 409,
  'stale-version': 409,
  'link-expired': 410,
  'body-too-large': 413,
  'not-json': 415,
  'invalid-request': 422,
  'not-applicable': 422,
  'too-many-requests': 429,
  internal: 500,
  unavailable: 503,
} as const;

export type ErrorCode = keyof typeof errorStatus;

/** A fault of one field: `path` joins keys and indexes with dots, as in `inputs.thresholds.0.heartRate`. */
export interface FieldError {
  path: string;
  code: string;
  message: string;
}

/** RFC 9457 problem details, as every failure answers; `id` stands in the server's log too. */
export interface ProblemDocument {
  type: string;
  title: string;
  status: number;
  code: ErrorCode;
  id: string;
  errors: FieldError[];
}
