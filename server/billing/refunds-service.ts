import { and, asc, eq, lt } from 'drizzle-orm';
import * as z from 'zod';
import type { RefundReason } from '@shared/contracts/billing-contract';
import type { AppContext } from '../app-context';
import { recordAudit, type AuditSource } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import { payments, refunds } from '../database/schema';
import { inTransaction } from '../database/transaction';
import { addJob, job } from '../jobs/job';
import type { Payments, PaymentsFailure, Refund } from '../payments/payments';
import {
  insertRefund,
  lockCharge,
  setChargeStatus,
  type ChargeRow,
  type PaymentRow,
} from './charges-repository';
import { post } from './ledger-repository';

export const byNobody = (at: Date): AuditSource => ({
  actorId: null,
  ip: null,
  sessionHash: null,
  at,
});

/** Gives a payment back once: the row is committed before the service is asked, and its id is the idempotency key. */
export async function requestRefund(
  tx: Transaction,
  payment: PaymentRow,
  { reason, createdBy }: { readonly reason: RefundReason; readonly createdBy: string | null },
): Promise<void> {
  const { id: paymentId, amountMinor, currency } = payment;
  const refundId = await insertRefund(tx, { paymentId, amountMinor, currency, reason, createdBy });
  if (refundId) await addJob(tx, 'send-refund', { refundId }, { jobKey: `refund:${refundId}` });
}

interface Given {
  readonly refund: typeof refunds.$inferSelect;
  readonly payment: PaymentRow;
}

async function readRefund(context: AppContext, refundId: string): Promise<Given | undefined> {
  const [row] = await context.database
    .select({ refund: refunds, payment: payments })
    .from(refunds)
    .innerJoin(payments, eq(payments.id, refunds.paymentId))
    .where(eq(refunds.id, refundId));
  return row;
}

function postRefund(tx: Transaction, charge: ChargeRow, { refund }: Given, at: Date) {
  const { amountMinor, currency } = refund;
  // What was paid for nothing stands in the receivable as owed to the payer; the rest is taken from income.
  const forNothing = charge.status !== 'paid' || refund.reason === 'paid-twice';
  const debit = forNothing ? 'receivable' : 'refunds';
  const key = `refund:${refund.id}`;
  return post(tx, { key, chargeId: charge.id, debit, credit: 'cash', amountMinor, currency, at });
}

/** Writes down that a refund came through; once, however often it is told. */
export async function settleRefund(
  tx: Transaction,
  given: Given,
  { serviceRefundId, now }: { readonly serviceRefundId: string | null; readonly now: Date },
): Promise<void> {
  const charge = await lockCharge(tx, given.payment.chargeId);
  if (!charge) return;
  const [row] = await tx.select().from(refunds).where(eq(refunds.id, given.refund.id));
  if (!row || row.status === 'settled') return;
  const id = serviceRefundId ?? row.serviceRefundId;
  await tx
    .update(refunds)
    .set({ status: 'settled', settledAt: now, serviceRefundId: id })
    .where(eq(refunds.id, row.id));
  await postRefund(tx, charge, given, now);
  const twice = row.reason === 'paid-twice';
  if (charge.status === 'paid' && !twice) await setChargeStatus(tx, charge.id, 'refunded');
  const { patientId } = charge;
  const object = { objectType: 'charge', objectId: charge.id, patientId };
  await recordAudit(tx, byNobody(now), [{ action: 'refund.settled', ...object }]);
}

async function refuse(context: AppContext, { refund }: Given, code: string): Promise<void> {
  const now = context.clock.now();
  await inTransaction(context.database, async (tx) => {
    await tx
      .update(refunds)
      .set({ status: 'failed' })
      .where(and(eq(refunds.id, refund.id), eq(refunds.status, 'pending')));
    const object = { objectType: 'refund', objectId: refund.id, outcome: 'failure' as const };
    const entry = { action: 'refund.failed', ...object, details: { code } };
    await recordAudit(tx, byNobody(now), [entry]);
  });
}

/** As the service has it: one that it took in is read, another is asked for with the same id as before. */
async function refundAtService(
  payments: Payments,
  { refund, payment }: Given,
  paymentIntentId: string,
): Promise<Refund | PaymentsFailure> {
  const { id: refundId, amountMinor, serviceRefundId } = refund;
  if (serviceRefundId !== null) return payments.retrieveRefund(serviceRefundId);
  const { chargeId } = payment;
  return payments.createRefund({ refundId, chargeId, paymentIntentId, amountMinor });
}

/**
 * Asks the payment service how a refund stands, or for it where it does not know it yet, and writes down the answer.
 * @throws Error when the service does not answer, or there is none
 */
async function resolveRefund(context: AppContext, refundId: string): Promise<void> {
  const given = await readRefund(context, refundId);
  const paymentIntentId = given?.payment.servicePaymentId ?? null;
  if (!given || given.refund.status !== 'pending' || paymentIntentId === null) return;
  if (!context.payments) throw new Error('No payment service is configured');
  const answer = await refundAtService(context.payments, given, paymentIntentId);
  const settle = (serviceRefundId: string | null) =>
    inTransaction(context.database, (tx) =>
      settleRefund(tx, given, { serviceRefundId, now: context.clock.now() }),
    );
  if (answer.outcome === 'unavailable') throw new Error('The payment service did not answer');
  if (answer.outcome !== 'refund') {
    // The money is back already: by our own earlier call, or by hand on the service's pages.
    if (answer.code === 'charge_already_refunded') return settle(null);
    return refuse(context, given, answer.code ?? answer.outcome);
  }
  const { status, serviceRefundId } = answer;
  if (status === 'failed') return refuse(context, given, 'failed');
  if (status === 'succeeded') return settle(serviceRefundId);
  await context.database.update(refunds).set({ serviceRefundId }).where(eq(refunds.id, refundId));
}

/** Asks the payment service to give the money back, and asks again with the same id until it has answered. */
export const sendRefund = job({
  name: 'send-refund',
  payload: z.object({ refundId: z.uuid() }),
  run: ({ refundId }, context) => resolveRefund(context, refundId),
});

/** Asks about refunds that stay pending, so that one whose event was lost, or whose asking died, is settled all the same. */
export async function resolvePendingRefunds(context: AppContext, before: Date): Promise<void> {
  const rows = await context.database
    .select({ id: refunds.id })
    .from(refunds)
    .where(and(eq(refunds.status, 'pending'), lt(refunds.createdAt, before)))
    .orderBy(asc(refunds.createdAt))
    .limit(200);
  for (const { id } of rows) {
    try {
      await resolveRefund(context, id);
    } catch (error) {
      context.log.warn({ err: error, refundId: id }, 'refund undecided');
    }
  }
}
