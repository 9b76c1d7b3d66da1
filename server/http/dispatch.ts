import type { Request, Response } from 'express';
import { requirePatientAccess } from '../accounts/access-service';
import type { AppContext } from '../app-context';
import { recordAudit, recordAuditAlone, type AuditEntry } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import { constraintOf, inTransaction } from '../database/transaction';
import { authorize } from './authorize';
import { checkAnswer } from './check-answer';
import type { Csrf } from './csrf';
import { fail, Failure } from './failure';
import { claimKey, idempotencyKeySchema, keepAnswer, type KeyedRequest } from './idempotency';
import { toFailure } from './problem';
import { parseInput, type BodyReader } from './request-input';
import { originOf, sourceOf } from './request-origin';
import { leaveUntouched } from './session-store';
import type { AnyAnswer, Call, Input, RequestShape, RouteDefinition } from './route';

export interface Dispatch {
  readonly route: RouteDefinition;
  readonly context: AppContext;
  readonly csrf: Csrf;
  readonly readBody: BodyReader;
}

type AnyCall = Call<RequestShape, 'public', 'one' | 'none'>;

/** One call on its way: what it brings, and the events that it has gathered. */
interface Way extends Dispatch {
  readonly request: Request;
  readonly response: Response;
  readonly input: Input<RequestShape>;
}

/**
 * Takes a call the whole way: authorize, parse, then in one transaction check the record, do the work and record it.
 * @returns the answer, held against its contract where that is asked for
 * @throws Failure for what was to be expected, anything else for what was not; both leave nothing behind
 */
export async function dispatch(
  dispatched: Dispatch,
  request: Request,
  response: Response,
): Promise<AnyAnswer> {
  const { route, context } = dispatched;
  if (route.keepsSessionAlive === false) leaveUntouched(request);
  authorize(route, request, dispatched.csrf);
  await route.throttle?.(originOf(request).ip);
  const body = await dispatched.readBody(request, response);
  const input = parseInput(route.request, request, body);
  const way: Way = { ...dispatched, request, response, input };
  const answer =
    route.transaction === 'none'
      ? await callWithoutTransaction(way)
      : await inTransaction(context.database, (tx) => callInTransaction(way, tx));
  if (context.settings.checkResponses) checkAnswer(route, answer);
  return answer;
}

async function callWithoutTransaction(way: Way): Promise<AnyAnswer> {
  const entries: AuditEntry[] = [];
  const answer = await handle(way, undefined, entries);
  await recordAuditAlone(way.context.database, sourceOf(way.request, way.context.clock), entries);
  return answer;
}

async function callInTransaction(way: Way, tx: Transaction): Promise<AnyAnswer> {
  const { route, request, input } = way;
  if (route.patient && request.actor) {
    await requirePatientAccess(tx, request.actor, route.patient(input));
  }
  const keyed = route.idempotent ? keyedRequest(way) : null;
  const earlier = keyed && (await claimKey(tx, keyed));
  if (earlier) return earlier;
  const entries: AuditEntry[] = [];
  const answer = await handle(way, tx, entries);
  if (keyed) await keepAnswer(tx, keyed, answer);
  await recordAudit(tx, sourceOf(request, way.context.clock), eventsOf(way, answer, entries));
  return answer;
}

async function handle(
  way: Way,
  tx: Transaction | undefined,
  entries: AuditEntry[],
): Promise<AnyAnswer> {
  const { route, context, request, response, input } = way;
  const call: AnyCall = {
    input,
    tx,
    context,
    actor: request.actor ?? null,
    origin: originOf(request),
    log: request.log,
    audit: (entry) => void entries.push(entry),
    http: { request, response },
  };
  const outcome = await route.handler(call);
  if (outcome instanceof Failure) throw outcome;
  return outcome;
}

function keyedRequest({ route, request, input, context }: Way): KeyedRequest {
  const key = idempotencyKeySchema.safeParse(request.get('idempotency-key'));
  if (!key.success) {
    const message = key.error.issues[0]?.message ?? '';
    const errors = [{ path: 'Idempotency-Key', code: 'invalid_type', message }];
    throw fail('invalid-request', { errors });
  }
  if (!request.actor) throw fail('unauthenticated');
  return {
    userId: request.actor.id,
    key: key.data,
    route: `${route.method} ${route.path}`,
    input: [input.params, input.query, input.body],
    now: context.clock.now(),
  };
}

/** The declared event, one a patient, after what the handler added. */
function eventsOf(way: Way, result: AnyAnswer, added: readonly AuditEntry[]): AuditEntry[] {
  const { audit } = way.route;
  if (typeof audit === 'string') return [...added];
  const facts = { input: way.input, result, actor: way.request.actor ?? null };
  const patients = audit.patientId?.(facts) ?? null;
  const details = audit.details?.(facts);
  const event: AuditEntry = {
    action: audit.action,
    objectType: audit.objectType,
    objectId: audit.objectId?.(facts) ?? null,
    ...(details && { details }),
  };
  const ids = Array.isArray(patients)
    ? (patients as readonly string[])
    : [patients as string | null];
  // A list that shows nobody is still a search that was made.
  const each = ids.length > 0 ? ids : [null];
  return [...added, ...each.map((patientId) => ({ ...event, patientId }))];
}

/** What was thrown as a failure of the closed list, with the route's own meaning of constraints. */
export function failureOf(route: RouteDefinition, error: unknown): Failure {
  const constraint = constraintOf(error);
  const code = constraint === undefined ? undefined : route.constraints?.[constraint];
  return code ? fail(code) : toFailure(error);
}
