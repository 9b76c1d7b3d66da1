/** Every code that a failure may carry, with its HTTP status; the list is closed. */
export const errorStatus = {
  'unreadable-body': 400,
  unauthenticated: 401,
  'wrong-credentials': 401,
  csrf: 403,
  forbidden: 403,
  'not-found': 404,
  'method-not-allowed': 405,
  'wrong-password': 403,
  'already-enrolled': 409,
  'already-recorded': 409,
  'already-signed': 409,
  'charge-not-open': 409,
  'class-closed': 409,
  'class-full': 409,
  'class-has-bookings': 409,
  'course-complete': 409,
  'daily-limit': 409,
  'email-taken': 409,
  'idempotency-key-reused': 409,
  'illegal-transition': 409,
  'late-cancellation': 409,
  'monitors-full': 409,
  'no-active-enrollment': 409,
  'not-checked-in': 409,
  'overlapping-appointment': 409,
  'price-changed': 409,
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

/** What each failure says to people: what is wrong and what to do about it. */
export const errorTitle: Readonly<Record<ErrorCode, string>> = {
  'unreadable-body': 'The request could not be read. Load the page again, then try once more.',
  unauthenticated: 'Sign in to go on.',
  'wrong-credentials': 'The e-mail address or the password is wrong.',
  csrf: 'This page is out of date. Load it again, then try once more.',
  forbidden: 'Your role does not allow this. Ask your administrator if you need it.',
  'wrong-password': 'Your current password is wrong.',
  'not-found': 'There is no such record, or it is not open to you.',
  'method-not-allowed': 'This address does not take that kind of request.',
  'already-enrolled': 'A course of this phase is running. End it before another begins.',
  'already-recorded': 'Something else is recorded under this id already.',
  'already-signed': 'This is signed already.',
  'charge-not-open': 'There is nothing left to pay here. Load the page again.',
  'class-closed': 'This class is closed, cancelled or past. Choose another date.',
  'class-full': 'This class is full. Choose another date.',
  'class-has-bookings':
    'Patients are booked on dates that this would move or remove. Speak to them first, or end this class and add another.',
  'course-complete': 'All sessions of this course are booked or done.',
  'daily-limit': 'No more sessions fit on this day. Choose another date.',
  'email-taken': 'Another account uses this e-mail address.',
  'idempotency-key-reused': 'This key was used for another request. Send it again with a new key.',
  'illegal-transition': 'That can no longer be done from the present status. Load the page again.',
  'late-cancellation':
    'It is now too late to cancel for free. Read what it costs, then decide again.',
  'monitors-full': 'All monitored places of this class are taken. Choose another date.',
  'no-active-enrollment': 'There is no active enrollment. Enroll the patient first.',
  'not-checked-in': 'Check the patient in first.',
  'overlapping-appointment': 'The patient has another class at this time.',
  'price-changed': 'The price is not what was shown. Load the page again before you pay.',
  'record-signed': 'This session record is signed. Correct a reading by an amendment.',
  'stale-version': 'Someone changed this in the meantime. Load it again, then repeat your change.',
  'link-expired': 'This link was used before or has expired. Ask for a new one.',
  'body-too-large': 'That is too much to send at once.',
  'not-json': 'The request must be sent as JSON.',
  'invalid-request': 'Some of what was entered is not valid.',
  'not-applicable': 'That choice does not apply here.',
  'too-many-requests': 'Too many tries. Wait a while, then try again.',
  internal:
    'Something went wrong on our side. Try again; if it stays, give this number to your administrator.',
  unavailable: 'Plimsoll is busy or can’t reach its database. Try again shortly.',
};

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
