import express, { type Request, type RequestHandler, type Response } from 'express';
import type * as z from 'zod';
import { fieldErrors } from '@shared/contracts/field-errors';
import type { FieldError } from '@shared/errors';
import { fail } from './failure';
import { requireStorable, requireStorableAddress } from './storable-text';
import type { Input, RequestShape, RouteDefinition } from './route';

const DEFAULT_BODY_LIMIT = 100 * 1024;

export interface Body {
  readonly value: unknown;
  /** The bytes of JSON; undefined where there is none. */
  readonly json?: Buffer | undefined;
}

/** Reads a request's body as its route wants it, after the caller was let in. */
export type BodyReader = (request: Request, response: Response) => Promise<Body>;

const hasBody = (request: Request): boolean =>
  request.headers['transfer-encoding'] !== undefined ||
  Number(request.headers['content-length'] ?? 0) > 0;

function run(parser: RequestHandler, request: Request, response: Response): Promise<unknown> {
  return new Promise((resolve, reject) => {
    void parser(request, response, (error?: unknown) => {
      if (error instanceof Error) reject(error);
      else resolve(request.body);
    });
  });
}

/**
 * @returns a reader that throws 415 for what is not JSON, 400 for JSON that cannot be read and 413 for too much; a
 * route without a body takes none or an empty object
 */
export function bodyReaderOf({ request: shape, bodyLimit }: RouteDefinition): BodyReader {
  const limit = bodyLimit ?? DEFAULT_BODY_LIMIT;
  if (shape.body === 'raw') {
    const raw = express.raw({ type: () => true, limit });
    return async (request, response) => ({ value: await run(raw, request, response) });
  }
  const sent = new WeakMap<object, Buffer>();
  const json = express.json({
    limit,
    strict: false,
    type: 'application/json',
    verify: (request, _response, raw) => void sent.set(request, raw),
  });
  return async (request, response) => {
    if (!hasBody(request)) return { value: undefined };
    if (!request.is('application/json')) throw fail('not-json');
    return { value: await run(json, request, response), json: sent.get(request) };
  };
}

function isEmpty(body: unknown): boolean {
  if (body === undefined || body === null) return true;
  return typeof body === 'object' && Object.keys(body).length === 0;
}

function partOf(schema: z.ZodType, value: unknown, errors: FieldError[]): unknown {
  const parsed = schema.safeParse(value);
  if (parsed.success) return parsed.data;
  errors.push(...fieldErrors(parsed.error));
  return undefined;
}

/**
 * Holds path, query, headers and body against the route's contract.
 * @throws Failure `invalid-request` with one error a field
 */
export function parseInput(shape: RequestShape, request: Request, body: Body): Input<RequestShape> {
  requireStorableAddress(request);
  const errors: FieldError[] = [];
  const read = (schema: z.ZodType | undefined, value: unknown): unknown =>
    schema ? partOf(schema, value, errors) : undefined;
  if (!shape.query) refuseExtra(Object.keys(request.query), errors);
  if (!shape.body && !isEmpty(body.value)) errors.push(unexpected('body'));
  const input = {
    params: read(shape.params, request.params),
    query: read(shape.query, request.query),
    headers: read(shape.headers, request.headers),
    body: shape.body === 'raw' ? (body.value ?? Buffer.alloc(0)) : read(shape.body, body.value),
  };
  if (errors.length > 0) throw fail('invalid-request', { errors });
  if (body.json) requireStorable(body.value, body.json);
  return input;
}

const unexpected = (path: string): FieldError => ({
  path,
  code: 'unrecognized_keys',
  message: 'Nothing is expected here',
});

function refuseExtra(keys: readonly string[], errors: FieldError[]): void {
  for (const key of keys) errors.push(unexpected(key));
}
