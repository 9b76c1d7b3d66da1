import type { HttpErrorResponse } from '@angular/common/http';
import type { ErrorCode, FieldError, ProblemDocument } from '@shared/errors';

/** `unreachable`: no answer came; `unreadable-answer`: one that is no problem document, as from a proxy. */
export type ProblemCode = ErrorCode | 'unreachable' | 'unreadable-answer';

/** A failed call, as pages show it. */
export class Problem extends Error {
  override readonly name = 'Problem';

  constructor(
    readonly code: ProblemCode,
    /** For people: what is wrong and what to do. */
    readonly title: string,
    readonly status: number,
    /** The reference that the server's log has too, null when the server did not answer. */
    readonly id: string | null = null,
    readonly errors: readonly FieldError[] = [],
    /** Seconds to wait before another try, from Retry-After. */
    readonly retryAfter: number | null = null,
  ) {
    super(title);
  }
}

function isProblemDocument(body: unknown): body is ProblemDocument {
  if (typeof body !== 'object' || body === null) return false;
  const { code, title, errors } = body as Partial<ProblemDocument>;
  return typeof code === 'string' && typeof title === 'string' && Array.isArray(errors);
}

function secondsOf(response: HttpErrorResponse): number | null {
  const seconds = Number.parseInt(response.headers.get('Retry-After') ?? '', 10);
  return Number.isNaN(seconds) ? null : seconds;
}

/** The body of a failed response to a request for text or a file comes unparsed. */
function bodyOf(response: HttpErrorResponse): unknown {
  const body: unknown = response.error;
  if (typeof body !== 'string') return body;
  try {
    return JSON.parse(body);
  } catch {
    return null;
  }
}

/** What went wrong, from Angular's answer to a failed call. */
export function problemFrom(response: HttpErrorResponse): Problem {
  const body = bodyOf(response);
  if (isProblemDocument(body)) {
    return new Problem(
      body.code,
      body.title,
      response.status,
      body.id,
      body.errors,
      secondsOf(response),
    );
  }
  if (response.status === 0) {
    return new Problem(
      'unreachable',
      'Plimsoll can’t be reached. Check the network, then try again.',
      0,
    );
  }
  return new Problem(
    'unreadable-answer',
    'The server gave an answer that this page can’t read. Try again; if it stays, tell your administrator.',
    response.status,
  );
}

/** Any failure as a problem: what is none already is a fault of this page. */
export function toProblem(error: unknown): Problem {
  if (error instanceof Problem) return error;
  console.error(error);
  return new Problem(
    'unreadable-answer',
    'This page could not do that. Load it again; if it stays, tell your administrator.',
    0,
  );
}
