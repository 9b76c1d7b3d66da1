import type { UndeliveredReason } from '@shared/contracts/messages-contract';
import type { Transaction } from '../database/client';
import { addJob } from '../jobs/job';

/** A message in the hands of this worker. */
export interface ClaimedMessage {
  readonly id: string;
  readonly kind: string;
  readonly dedupeKey: string;
  readonly patientId: string | null;
  readonly userId: string | null;
  readonly subject: Readonly<Record<string, string>>;
  readonly dueAt: Date;
  /** Tries so far, this one counted. */
  readonly attempts: number;
}

/** Longer than the mailer may take; whoever still holds a message then is gone. */
const HOLD_MS = 2 * 60_000;

/**
 * Takes a message that is due and that nobody else holds. The hold is a time, not a lock: no transaction stays open while
 * the mail server is spoken with, and another worker takes over what a dead one held.
 */
export async function claimMessage(
  tx: Transaction,
  id: string,
  now: Date,
): Promise<ClaimedMessage | undefined> {
  const { rows } = await tx.connection.query<ClaimedMessage>({
    name: 'claim-message',
    text: `
      UPDATE outbox SET status = 'sending', attempts = attempts + 1, hold_until = $3
       WHERE id = (SELECT id FROM outbox
                    WHERE id = $1 AND status IN ('pending', 'uncertain', 'sending')
                      AND due_at <= $2 AND coalesce(hold_until, due_at) <= $2
                      FOR UPDATE SKIP LOCKED)
      RETURNING id, kind, dedupe_key AS "dedupeKey", patient_id AS "patientId", user_id AS "userId", subject,
                due_at AS "dueAt", attempts`,
    values: [id, now, new Date(now.getTime() + HOLD_MS)],
  });
  return rows[0];
}

export async function markSent(tx: Transaction, id: string, now: Date): Promise<void> {
  await tx.connection.query(
    `UPDATE outbox SET status = 'sent', sent_at = $2, hold_until = NULL, last_error = NULL WHERE id = $1`,
    [id, now],
  );
}

/** Leaves a message for good: `cancelled` when there is nothing left to tell or nobody who wants to hear it, else `failed`. */
export async function markEnded(
  tx: Transaction,
  id: string,
  {
    status,
    reason,
  }: { status: 'cancelled' | 'failed'; reason: UndeliveredReason | 'overtaken' | 'declined' },
): Promise<void> {
  await tx.connection.query(
    'UPDATE outbox SET status = $2, last_error = $3, hold_until = NULL WHERE id = $1',
    [id, status, reason],
  );
}

/** Puts a message back for another try; `uncertain` when the mail server may have it already. */
export async function postpone(
  tx: Transaction,
  { id, dedupeKey }: ClaimedMessage,
  { status, until }: { readonly status: 'pending' | 'uncertain'; readonly until: Date },
): Promise<void> {
  await tx.connection.query('UPDATE outbox SET status = $2, hold_until = $3 WHERE id = $1', [
    id,
    status,
    until,
  ]);
  await addJob(tx, 'send-message', { outboxId: id }, { jobKey: dedupeKey, runAt: until });
}

interface Overdue {
  readonly id: string;
  readonly dedupeKey: string;
}

/** Messages past their time for which no job waits: their worker died, or mail was not set up. */
export async function overdueMessages(tx: Transaction, now: Date): Promise<Overdue[]> {
  const { rows } = await tx.connection.query<Overdue>(
    `SELECT id, dedupe_key AS "dedupeKey" FROM outbox o
      WHERE status IN ('pending', 'uncertain', 'sending') AND due_at <= $1
        AND coalesce(hold_until, due_at) <= $1
        AND NOT EXISTS (SELECT FROM graphile_worker.jobs j WHERE j.key = o.dedupe_key AND j.locked_at IS NULL)
      ORDER BY due_at LIMIT 1000`,
    [now],
  );
  return rows;
}

export async function suppress(tx: Transaction, address: string, reason: string): Promise<void> {
  await tx.connection.query(
    'INSERT INTO suppressions (address, reason) VALUES (lower($1), $2) ON CONFLICT DO NOTHING',
    [address, reason],
  );
}

export async function isSuppressed(tx: Transaction, address: string): Promise<boolean> {
  const { rowCount } = await tx.connection.query(
    'SELECT FROM suppressions WHERE address = lower($1)',
    [address],
  );
  return rowCount === 1;
}
