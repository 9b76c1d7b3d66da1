import { v7 as uuidv7 } from 'uuid';
import type { MessageKind } from '@shared/contracts/messages-contract';
import type { Transaction } from '../database/client';
import { addJob } from '../jobs/job';

export interface NewMessage {
  readonly kind: MessageKind;
  /** A message with the same key is sent once, ever. */
  readonly dedupeKey: string;
  readonly userId?: string;
  readonly patientId?: string;
  /** Ids of what the message is about, never its words: they are read again when it is sent. */
  readonly subject: Readonly<Record<string, string>>;
  readonly dueAt: Date;
}

/** Writes a message into the outbox in the transaction of what it tells of; a job sends it when it is due. */
export async function enqueueMessage(tx: Transaction, message: NewMessage): Promise<void> {
  const { kind, dedupeKey, userId, patientId, subject, dueAt } = message;
  const id = uuidv7();
  const added = await tx.connection.query(
    `INSERT INTO outbox (id, kind, dedupe_key, user_id, patient_id, subject, due_at)
     VALUES ($1, $2, $3, $4, $5, $6, $7) ON CONFLICT (dedupe_key) DO NOTHING`,
    [id, kind, dedupeKey, userId ?? null, patientId ?? null, subject, dueAt],
  );
  if (added.rowCount === 0) return;
  await addJob(tx, 'send-message', { outboxId: id }, { jobKey: dedupeKey, runAt: dueAt });
}

/** Takes back a message that has not gone out; one that is on its way reads the state again by itself. */
export async function withdrawMessage(tx: Transaction, dedupeKey: string): Promise<void> {
  await tx.connection.query(
    `UPDATE outbox SET status = 'cancelled', last_error = 'withdrawn'
      WHERE dedupe_key = $1 AND status = 'pending'`,
    [dedupeKey],
  );
}
