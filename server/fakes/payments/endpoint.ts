import { createHash } from 'node:crypto';
import { setTimeout as sleep } from 'node:timers/promises';
import type { Request, RequestHandler, Response } from 'express';
import { ApiError } from './api-error';
import { findObject, onShelf } from './book';
import type { Cause, Desk } from './desk';
import { apiVersion, makeId } from './objects';

export interface Call extends Cause {
  /** Ids in the path. */
  path: Record<string, string>;
  /** Form body or query, not yet read by a schema. */
  input: unknown;
}

/** Does one call at once, without waiting, so that two with one key cannot interleave. */
type Handler = (desk: Desk, call: Call) => object;

interface Answer {
  status: number;
  body: unknown;
}

/** Wraps a handler in what every endpoint does: key, faults, idempotency, expansion, saving. */
export function endpoint(desk: Desk, handler: Handler): RequestHandler {
  return async (request, response) => {
    const requestId = makeId('req');
    response.set({ 'request-id': requestId, 'stripe-version': apiVersion });
    const fault = desk.faults.next(request.method, request.path);
    const refused = authenticate(desk, request) ?? refuseBy(fault);
    const answer = refused ?? answerOnce(desk, request, response, requestId, handler, fault);
    await desk.save();
    if (fault?.kind === 'late') await sleep(fault.milliseconds);
    if (fault?.kind === 'cut') {
      request.socket.destroy();
      return;
    }
    response.status(answer.status).json(answer.body);
  };
}

type Met = ReturnType<Desk['faults']['next']>;

function refuseBy(fault: Met): Answer | undefined {
  if (fault?.kind !== 'refuse') return undefined;
  return failure(fault.status, 'Something went wrong on our end, before your request was begun.');
}

function failure(status: number, message: string): Answer {
  return { status, body: new ApiError(status, 'api_error', { message }).body };
}

function authenticate(desk: Desk, request: Request): Answer | undefined {
  const key = /^Bearer (\S+)$/.exec(request.get('authorization') ?? '')?.[1] ?? '';
  const { apiKey } = desk.settings;
  if (apiKey === null ? /^[sr]k_test_\w+$/.test(key) : key === apiKey) return undefined;
  const shown = key === '' ? 'none was given' : `${key.slice(0, 8)}${'*'.repeat(8)}`;
  const error = new ApiError(401, 'invalid_request_error', {
    message: `Invalid API Key provided: ${shown}`,
  });
  return { status: 401, body: error.body };
}

function answerOnce(
  desk: Desk,
  request: Request,
  response: Response,
  requestId: string,
  handler: Handler,
  fault: Met,
): Answer {
  const idempotencyKey =
    request.method === 'POST' ? (request.get('idempotency-key') ?? null) : null;
  const call: Call = {
    path: request.params as Record<string, string>,
    input: request.method === 'POST' ? request.body : request.query,
    requestId,
    idempotencyKey,
  };
  if (idempotencyKey === null) return attempt(desk, call, handler, fault).answer;
  if (idempotencyKey.length > 255)
    return keyError('An idempotency key has 255 characters at most.');
  const fingerprint = fingerprintOf(request);
  const kept = onShelf(desk.book.answers, idempotencyKey);
  if (kept) {
    if (kept.fingerprint !== fingerprint) {
      return keyError(
        `Keys for idempotent requests can only be used with the same parameters they were first used with. Try using a key other than '${idempotencyKey}' if you meant to execute a different request.`,
      );
    }
    response.set({ 'idempotent-replayed': 'true', 'original-request': kept.requestId });
    return kept;
  }
  const { answer, begun } = attempt(desk, call, handler, fault);
  if (begun) desk.book.answers[idempotencyKey] = { fingerprint, requestId, ...answer };
  return answer;
}

function keyError(message: string): Answer {
  return { status: 400, body: new ApiError(400, 'idempotency_error', { message }).body };
}

function fingerprintOf(request: Request): string {
  return createHash('sha256')
    .update(`${request.method} ${request.path}\n${JSON.stringify(request.body ?? {})}`)
    .digest('hex');
}

function attempt(
  desk: Desk,
  call: Call,
  handler: Handler,
  fault: Met,
): { answer: Answer; begun: boolean } {
  if (fault?.kind === 'fail') {
    return { answer: failure(fault.status, 'Something went wrong on our end.'), begun: true };
  }
  try {
    const body = handler(desk, call);
    return { answer: { status: 200, body: expand(desk, body, call.input) }, begun: true };
  } catch (error) {
    if (!(error instanceof ApiError)) throw error;
    return { answer: { status: error.status, body: error.body }, begun: error.begun };
  }
}

/** Puts objects in the place of their ids where the caller asked for it. */
function expand(desk: Desk, body: object, input: unknown): object {
  const paths = (input as { expand?: unknown } | undefined)?.expand;
  const copy = structuredClone(body);
  if (Array.isArray(paths))
    for (const path of paths) expandOne(desk, copy, String(path).split('.'));
  return copy;
}

function expandOne(desk: Desk, target: unknown, path: string[]): void {
  if (Array.isArray(target)) {
    for (const element of target) expandOne(desk, element, path);
    return;
  }
  const [key, ...rest] = path;
  if (key === undefined || typeof target !== 'object' || target === null) return;
  const holder = target as Record<string, unknown>;
  if (!Object.hasOwn(holder, key)) {
    throw new ApiError(
      400,
      'invalid_request_error',
      { message: `This property cannot be expanded (${key}).`, param: 'expand' },
      false,
    );
  }
  const value = holder[key];
  if (typeof value === 'string')
    holder[key] = structuredClone(findObject(desk.book, value) ?? value);
  expandOne(desk, holder[key], rest);
}
