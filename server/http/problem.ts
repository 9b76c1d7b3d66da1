import { DrizzleQueryError } from 'drizzle-orm';
import type { Request, Response } from 'express';
import { errorStatus, errorTitle, type ErrorCode } from '@shared/errors';
import { databaseErrorOf } from '../database/transaction';
import { fail, Failure } from './failure';

const RETRY_AFTER_SECONDS = 5;

/** What body-parser calls its refusals. */
const BODY_FAILURES: Readonly<Record<string, ErrorCode>> = {
  'entity.too.large': 'body-too-large',
  'charset.unsupported': 'not-json',
  'encoding.unsupported': 'not-json',
  'entity.parse.failed': 'unreadable-body',
  'entity.verify.failed': 'unreadable-body',
  'request.aborted': 'unreadable-body',
  'request.size.invalid': 'unreadable-body',
  'stream.encoding.set': 'internal',
};

/** Classes 08 connection, 53 resources, 57 intervention (which ends what takes too long), 25006 a replica. */
const UNAVAILABLE_STATE = /^(08|53|57|25006)/;
const UNAVAILABLE_ERRNO = /^(ECONNREFUSED|ECONNRESET|ENOTFOUND|EPIPE|ETIMEDOUT|EHOSTUNREACH)$/;
const UNAVAILABLE_POOL =
  /^(timeout exceeded when trying to connect|Connection terminated|Client has encountered a connection error)/;

/** Whether the database could not be reached, rather than refused something. */
export function isUnavailable(error: unknown): boolean {
  const state = databaseErrorOf(error)?.code;
  if (state !== undefined) return UNAVAILABLE_STATE.test(state);
  const cause = error instanceof DrizzleQueryError ? error.cause : error;
  if (!(cause instanceof Error)) return false;
  const errno = (cause as NodeJS.ErrnoException).code ?? '';
  return UNAVAILABLE_ERRNO.test(errno) || UNAVAILABLE_POOL.test(cause.message);
}

function bodyFailure(error: unknown): ErrorCode | undefined {
  const type = (error as { type?: unknown } | null)?.type;
  return typeof type === 'string' ? BODY_FAILURES[type] : undefined;
}

/** Whatever was thrown, as one of the closed list; what nobody expected is `internal`. */
export function toFailure(error: unknown): Failure {
  if (error instanceof Failure) return error;
  const body = bodyFailure(error);
  if (body) return fail(body);
  // decodeURIComponent's complaint about a path like /%zz
  if (error instanceof URIError) return fail('not-found');
  if (isUnavailable(error)) {
    return fail('unavailable', { retryAfterSeconds: RETRY_AFTER_SECONDS });
  }
  return fail('internal');
}

/** The reference that the log, the audit and a problem document share. */
export const callId = (request: Request): string => request.id as string;

/** Answers a failure as RFC 9457 asks, the one place that does. */
export function sendProblem(response: Response, failure: Failure): void {
  const { code, details } = failure;
  const status = errorStatus[code];
  response.locals['code'] = code;
  if (details.retryAfterSeconds !== undefined) {
    response.set('Retry-After', String(Math.max(1, Math.ceil(details.retryAfterSeconds))));
  }
  response
    .status(status)
    .type('application/problem+json')
    .send(
      JSON.stringify({
        ...details.more,
        type: `/problems/${code}`,
        title: details.title ?? errorTitle[code],
        status,
        code,
        id: callId(response.req),
        errors: details.errors ?? [],
      }),
    );
}
