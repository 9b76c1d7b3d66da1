import { and, eq, inArray, lt } from 'drizzle-orm';
import * as z from 'zod';
import { payments } from '../database/schema';
import { inTransaction } from '../database/transaction';
import { job, type JobDefinition } from '../jobs/job';
import { note, resolveAttempt } from './checkout-service';
import { resolvePendingRefunds, sendRefund } from './refunds-service';
import { expire } from './settling-service';

/** Long enough for a payer's own return and the service's event to come first. */
const UNDECIDED_MS = 5 * 60_000;

const undecided = (before: Date) =>
  and(inArray(payments.status, ['preparing', 'pending']), lt(payments.createdAt, before));

/** Asks the service about attempts and refunds that nobody told the end of, so that a lost event loses no money. */
const reconcilePayments = job({
  name: 'reconcile-payments',
  payload: z.object({}),
  schedule: '*/10 * * * *',
  atStart: true,
  run: async (_, context) => {
    const { payments: service, database } = context;
    if (!service) return;
    const before = new Date(context.clock.now().getTime() - UNDECIDED_MS);
    const rows = await database.select().from(payments).where(undecided(before)).limit(200);
    for (const attempt of rows) await resolveAttempt(context, service, attempt);
    await resolvePendingRefunds(context, before);
  },
});

/** Closes the pay page of a charge that was taken back. */
const closeAttempt = job({
  name: 'close-attempt',
  payload: z.object({ paymentId: z.uuid() }),
  run: async ({ paymentId }, context) => {
    const { database, payments: service } = context;
    const [row] = await database.select().from(payments).where(eq(payments.id, paymentId));
    if (!row || !['preparing', 'pending'].includes(row.status)) return;
    if (row.serviceSessionId !== null && service) {
      const session = await service.expireSession(row.serviceSessionId);
      if (session.outcome === 'unavailable') throw new Error('The payment service did not answer');
      if (session.outcome === 'session') return note(context, row.id, session);
    }
    await inTransaction(database, (tx) => expire(tx, row.id));
  },
});

export const billingJobs: readonly JobDefinition[] = [reconcilePayments, closeAttempt, sendRefund];
