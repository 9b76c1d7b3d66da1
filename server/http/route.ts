import type { Request, Response } from 'express';
import type { Logger } from 'pino';
import type * as z from 'zod';
import type { ErrorCode } from '@shared/errors';
import type { Role } from '@shared/contracts/accounts-contract';
import type { Actor } from '../accounts/actor';
import type { AppContext } from '../app-context';
import type { AuditEntry } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import type { Failure } from './failure';

export type Method = 'get' | 'post' | 'put' | 'patch' | 'delete';

/** Anyone; anyone signed in; or anyone who holds one of the roles. */
export type Access = 'public' | 'signed-in' | { readonly roles: readonly Role[] };

/** What a route takes. A body of `'raw'` arrives as the bytes that were sent. */
export interface RequestShape {
  readonly params?: z.ZodType;
  readonly query?: z.ZodType;
  readonly headers?: z.ZodType;
  readonly body?: z.ZodType | 'raw';
}

type Parsed<S> = S extends z.ZodType ? z.output<S> : S extends 'raw' ? Buffer : undefined;

export interface Input<R extends RequestShape> {
  readonly params: Parsed<R['params']>;
  readonly query: Parsed<R['query']>;
  readonly headers: Parsed<R['headers']>;
  readonly body: Parsed<R['body']>;
}

/** An answer that is not JSON: text of the given type, or a stream that the handler writes itself. */
export interface TextAnswer {
  readonly text: string;
}
export interface StreamAnswer {
  readonly stream: string;
}
/** An answer of bytes, such as a PDF. */
export interface FileAnswer {
  readonly file: string;
}
export const fileAnswer = (contentType: string): FileAnswer => ({ file: contentType });
export const textAnswer = (contentType: string): TextAnswer => ({ text: contentType });
export const eventStream: StreamAnswer = { stream: 'text/event-stream' };

/** What a route answers by status; null is no body. Failures need not be listed. */
export type Answers = Readonly<
  Record<number, z.ZodType | TextAnswer | FileAnswer | StreamAnswer | null>
>;

type BodyOf<S> = S extends z.ZodType
  ? { readonly body: z.input<S> }
  : S extends TextAnswer
    ? { readonly body: string }
    : S extends FileAnswer
      ? { readonly body: Buffer }
      : S extends StreamAnswer
        ? { readonly body: (response: Response) => void }
        : { readonly body?: undefined };

export type Success<A extends Answers> = {
  [S in keyof A & number]: {
    readonly status: S;
    readonly headers?: Readonly<Record<string, string>>;
  } & BodyOf<A[S]>;
}[keyof A & number];

/** Where a call comes from, for audit and log. */
export interface CallOrigin {
  /** The reference that the log, the audit and a problem document share. */
  readonly id: string;
  readonly ip: string;
  /** SHA-256 of the session id; null for a visitor. */
  readonly sessionHash: string | null;
}

export interface Call<R extends RequestShape, A extends Access, T extends 'one' | 'none'> {
  readonly input: Input<R>;
  readonly actor: A extends 'public' ? Actor | null : Actor;
  readonly context: AppContext;
  /** The route's one transaction; undefined where the route declares `transaction: 'none'`. */
  readonly tx: T extends 'one' ? Transaction : undefined;
  readonly origin: CallOrigin;
  readonly log: Logger;
  /** Adds an event to what the route's transaction records. */
  readonly audit: (entry: AuditEntry) => void;
  /** Express's own pair, for sessions, cookies and streams alone. */
  readonly http: { readonly request: Request; readonly response: Response };
}

interface AuditFacts<R extends RequestShape, A extends Answers> {
  readonly input: Input<R>;
  readonly result: Success<A>;
  readonly actor: Actor | null;
}

/** The event that a success leaves, written in the transaction that it tells of. */
export interface AuditDeclaration<R extends RequestShape, A extends Answers> {
  readonly action: string;
  readonly objectType: string;
  readonly objectId?: (facts: AuditFacts<R, A>) => string | null;
  /** Whose record was read or changed: an event a patient. */
  readonly patientId?: (facts: AuditFacts<R, A>) => string | readonly string[] | null;
  readonly details?: (facts: AuditFacts<R, A>) => Record<string, unknown>;
}

export interface RouteOptions<
  R extends RequestShape,
  A extends Access,
  S extends Answers,
  T extends 'one' | 'none',
> {
  readonly method: Method;
  /** Express's form: `/api/patients/:id`. */
  readonly path: string;
  readonly summary: string;
  readonly access: A;
  /** Whose record the route opens: the caller's relation to it is checked first, and a miss is 404. */
  readonly patient?: (input: Input<R>) => string;
  /** What is recorded of a success: an event, nothing, or what the handler adds by `call.audit`. */
  readonly audit: AuditDeclaration<R, S> | 'none' | 'handler';
  readonly request: R;
  readonly response: S;
  /** `'none'`: the handler opens its own transactions, or needs none (default `'one'`). */
  readonly transaction?: T;
  /** Requires an Idempotency-Key and answers a repeated request with the first answer; needs the one transaction. */
  readonly idempotent?: true;
  /** Only for callers that hold no session: the payment webhook and one-click unsubscribe. */
  readonly csrf?: 'exempt';
  /** Failures that constraints of the database stand for, by constraint name. */
  readonly constraints?: Readonly<Record<string, ErrorCode>>;
  /** Counts the call by address and refuses it when there are too many, before any of it is read. */
  readonly throttle?: (ip: string) => Promise<void>;
  /** Bytes (default 100 kB). */
  readonly bodyLimit?: number;
  /** False for what a page calls by itself, so that an unattended page still signs out. */
  readonly keepsSessionAlive?: boolean;
  readonly handler: (call: Call<R, A, T>) => Promise<Success<S> | Failure>;
}

export type AnyAnswer = Success<Answers>;

/** A route as the registry holds it, its types worn off. */
export type RouteDefinition = RouteOptions<RequestShape, Access, Answers, 'one' | 'none'>;

/**
 * Declares an endpoint: who may call it, what it takes and answers, what it records.
 * @throws when it states no access, no audit, or what does not fit together
 */
export function route<
  const R extends RequestShape,
  const A extends Access,
  const S extends Answers,
  T extends 'one' | 'none' = 'one',
>(options: RouteOptions<R, A, S, T>): RouteDefinition {
  const definition = options as unknown as RouteDefinition;
  checkRoute(definition);
  return definition;
}

/** @throws when the declaration is one that must not be mounted */
export function checkRoute(definition: RouteDefinition): void {
  const { access, audit, method, path, transaction, idempotent } = definition;
  const wrong = (what: string): never => {
    throw new Error(`${method.toUpperCase()} ${path} ${what}`);
  };
  if (access !== 'public' && access !== 'signed-in' && !access?.roles?.length) {
    wrong('states no access');
  }
  if (!audit) wrong('states no audit');
  const withoutTransaction = transaction === 'none';
  if (withoutTransaction && (idempotent || definition.patient || typeof audit === 'object')) {
    wrong('needs the one transaction for its key, its record or its audit');
  }
  if (access === 'public' && (idempotent || definition.patient)) wrong('needs a known caller');
}
