import * as z from 'zod';
import { inTransaction } from '../database/transaction';
import { enqueueMessage } from '../messages/messages-service';
import { job } from '../jobs/job';
import { findActor } from './accounts-repository';

const DAY = 24 * 60 * 60_000;
/** Asking again within this time sends no second message. */
const RESET_EVERY = 5 * 60_000;

/** What the sign-in page asked for, whether or not anybody was meant. */
const offerPasswordReset = job({
  name: 'offer-password-reset',
  payload: z.object({ userId: z.uuid().nullable() }),
  run: async ({ userId }, { database, clock }) => {
    if (!userId) return;
    const now = clock.now();
    await inTransaction(database, async (tx) => {
      if (!(await findActor(tx, userId))) return;
      await enqueueMessage(tx, {
        kind: 'password-reset',
        dedupeKey: `password-reset:${userId}:${Math.floor(now.getTime() / RESET_EVERY)}`,
        userId,
        subject: { userId },
        dueAt: now,
      });
    });
  },
});

/** Counts of failed tries on real accounts stay: a hundred in a row end only by a success or a new password. */
const clearExpired = job({
  name: 'clear-expired-accounts',
  payload: z.object({}),
  schedule: '17 3 * * *',
  run: async (_payload, { database, clock }) => {
    const now = clock.now();
    const pool = database.$client;
    await pool.query('DELETE FROM sessions WHERE expire <= $1', [now]);
    await pool.query('DELETE FROM user_tokens WHERE expires_at <= $1', [
      new Date(now.getTime() - 30 * DAY),
    ]);
    await pool.query('DELETE FROM idempotency_keys WHERE created_at <= $1', [
      new Date(now.getTime() - DAY),
    ]);
    await pool.query(
      `DELETE FROM rate_limits WHERE expire <= $1 AND (starts_with(key, 'unknown:') OR starts_with(key, 'address:'))`,
      [now.getTime() - DAY],
    );
  },
});

export const accountsJobs = [offerPasswordReset, clearExpired];
