import { createHash } from 'node:crypto';
import * as z from 'zod';
import type { Transaction } from '../database/client';
import { fail } from './failure';
import type { AnyAnswer } from './route';

const DAY = 24 * 60 * 60_000;

export const idempotencyKeySchema = z
  .string('Send an Idempotency-Key of your own making')
  .min(1, 'Use 1 to 255 characters')
  .max(255, 'Use 1 to 255 characters');

export interface KeyedRequest {
  readonly userId: string;
  readonly key: string;
  /** Method and path by template. */
  readonly route: string;
  readonly input: unknown;
  readonly now: Date;
}

interface StoredAnswer {
  readonly route: string;
  readonly request_hash: string;
  readonly status: number;
  readonly response: unknown;
}

/** The same for the same values, whatever the order of keys. */
function canonical(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(canonical);
  if (value === null || typeof value !== 'object' || value instanceof Date) return value;
  const entries = Object.entries(value).sort(([a], [b]) => (a < b ? -1 : 1));
  return Object.fromEntries(entries.map(([key, item]) => [key, canonical(item)]));
}

const hashOf = (input: unknown): string =>
  createHash('sha256')
    .update(JSON.stringify(canonical(input)) ?? '')
    .digest('base64url');

/**
 * Takes the key for this transaction; another request with it waits until this one ends. A key is free again after
 * 24 hours, and at once when the transaction is rolled back, since then nothing was done.
 * @returns null when the request is the first, else the answer that the first one got
 * @throws Failure `idempotency-key-reused` when the first request was another
 */
export async function claimKey(tx: Transaction, request: KeyedRequest): Promise<AnyAnswer | null> {
  const { userId, key, route, now } = request;
  const requestHash = hashOf(request.input);
  const claimed = await tx.connection.query({
    name: 'claim-key',
    text: `INSERT INTO idempotency_keys AS k (user_id, key, route, request_hash, status, response, created_at)
           VALUES ($1, $2, $3, $4, 0, 'null', $5)
           ON CONFLICT (user_id, key) DO UPDATE
             SET route = $3, request_hash = $4, status = 0, response = 'null', created_at = $5
             WHERE k.created_at <= $6`,
    values: [userId, key, route, requestHash, now, new Date(now.getTime() - DAY)],
  });
  if (claimed.rowCount === 1) return null;
  const { rows } = await tx.connection.query<StoredAnswer>(
    'SELECT route, request_hash, status, response FROM idempotency_keys WHERE user_id = $1 AND key = $2',
    [userId, key],
  );
  const [first] = rows;
  if (!first || first.route !== route || first.request_hash !== requestHash) {
    throw fail('idempotency-key-reused');
  }
  return { status: first.status, body: first.response };
}

/** Keeps the answer beside the key, in the transaction of its effect. */
export async function keepAnswer(
  tx: Transaction,
  { userId, key }: KeyedRequest,
  answer: AnyAnswer,
): Promise<void> {
  await tx.connection.query({
    name: 'keep-answer',
    text: 'UPDATE idempotency_keys SET status = $3, response = $4 WHERE user_id = $1 AND key = $2',
    values: [userId, key, answer.status, JSON.stringify(answer.body ?? null)],
  });
}
