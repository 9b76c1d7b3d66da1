import * as z from 'zod';

type ErrorType = 'api_error' | 'card_error' | 'idempotency_error' | 'invalid_request_error';

export interface ErrorDetails {
  code?: string;
  message: string;
  param?: string;
}

/** A refusal in the service's own form, from which the SDK makes its typed errors. */
export class ApiError extends Error {
  constructor(
    readonly status: number,
    readonly type: ErrorType,
    readonly details: ErrorDetails,
    /** Whether the endpoint had begun: only then is the answer kept under the idempotency key. */
    readonly begun = true,
  ) {
    super(details.message);
  }

  get body(): { error: ErrorDetails & { type: ErrorType } } {
    return { error: { type: this.type, ...this.details } };
  }
}

/** No such object, or not for this key. */
export function missing(kind: string, id: string, param = 'id'): ApiError {
  return new ApiError(404, 'invalid_request_error', {
    code: 'resource_missing',
    message: `No such ${kind}: '${id}'`,
    param,
  });
}

function paramPath(path: readonly PropertyKey[]): string {
  return path.map((key, index) => (index === 0 ? String(key) : `[${String(key)}]`)).join('');
}

function refuse(issue: z.core.$ZodIssue): ApiError {
  if (issue.code === 'unrecognized_keys') {
    const param = paramPath([...issue.path, issue.keys[0] ?? '']);
    return parameterError('parameter_unknown', `Received unknown parameter: ${param}`, param);
  }
  const param = paramPath(issue.path);
  return issue.code === 'invalid_type' && issue.input === undefined
    ? parameterError('parameter_missing', `Missing required param: ${param}.`, param)
    : parameterError('parameter_invalid', `Invalid ${param}: ${issue.message}`, param);
}

export function parameterError(code: string, message: string, param: string): ApiError {
  return new ApiError(400, 'invalid_request_error', { code, message, param }, false);
}

/** Reads form parameters by a schema; the first fault is the refusal, as the service does it. */
export function readParameters<S extends z.ZodType>(schema: S, input: unknown): z.output<S> {
  const parsed = schema.safeParse(input ?? {}, { reportInput: true });
  if (parsed.success) return parsed.data;
  const [issue] = parsed.error.issues;
  throw issue ? refuse(issue) : new Error('A failed parse names no fault.');
}

/** A whole number as a form sends it. */
export const formInteger = z
  .string()
  .regex(/^\d{1,12}$/, 'Invalid integer')
  .transform(Number);

/** At most 50 keys of 40 characters, values of 500, as the service's reference says. */
export const formMetadata = z
  .record(z.string().max(40), z.string().max(500))
  .refine((pairs) => Object.keys(pairs).length <= 50, 'At most 50 keys')
  .default({});

export const formExpand = z.array(z.string()).max(20).default([]);
