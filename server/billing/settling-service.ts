import { eq } from 'drizzle-orm';
import { recordAudit } from '../audit/audit-service';
import type { Transaction } from '../database/client';
import { payments, refunds } from '../database/schema';
import { enqueueMessage } from '../messages/messages-service';
import {
  findPayment,
  lockCharge,
  setChargeStatus,
  settledPayment,
  updatePayment,
  type ChargeRow,
  type PaymentRow,
} from './charges-repository';
import { post } from './ledger-repository';
import { byNobody, requestRefund, settleRefund } from './refunds-service';

/** What the payment service says was paid. */
export interface Paid {
  /** Our own id of the attempt, which the service carries; null when it carries none of ours. */
  readonly attemptId: string | null;
  readonly paymentIntentId: string | null;
  readonly amountMinor: number;
  readonly currency: string;
}

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/;

async function attemptOf(tx: Transaction, attemptId: string | null) {
  if (attemptId === null || !uuid.test(attemptId)) return undefined;
  const seen = await findPayment(tx, attemptId);
  if (!seen) return undefined;
  const charge = await lockCharge(tx, seen.chargeId);
  const payment = await findPayment(tx, attemptId);
  return charge && payment && { charge, payment };
}

const agrees = (paid: Paid, payment: PaymentRow): boolean =>
  paid.amountMinor === payment.amountMinor &&
  paid.currency.toUpperCase() === payment.currency.toUpperCase();

async function audit(tx: Transaction, action: string, charge: ChargeRow, now: Date) {
  const object = { objectType: 'charge', objectId: charge.id, patientId: charge.patientId };
  await recordAudit(tx, byNobody(now), [{ action, ...object }]);
}

function postReceived(tx: Transaction, payment: PaymentRow, at: Date): Promise<void> {
  const { id, chargeId, amountMinor, currency } = payment;
  const sides = { debit: 'cash', credit: 'receivable' } as const;
  return post(tx, { key: `payment:${id}`, chargeId, ...sides, amountMinor, currency, at });
}

/** A second payment of one charge goes back at once. */
async function returnSecond(tx: Transaction, payment: PaymentRow, paid: Paid, now: Date) {
  await postReceived(tx, payment, now);
  await updatePayment(tx, payment.id, {
    status: 'failed',
    servicePaymentId: paid.paymentIntentId,
  });
  await requestRefund(tx, payment, { reason: 'paid-twice', createdBy: null });
}

async function receive(
  tx: Transaction,
  { charge, payment }: { readonly charge: ChargeRow; readonly payment: PaymentRow },
  { paymentIntentId }: Paid,
  now: Date,
): Promise<void> {
  const { id, chargeId } = payment;
  const settled = { status: 'settled', settledAt: now, servicePaymentId: paymentIntentId } as const;
  await updatePayment(tx, id, settled);
  await postReceived(tx, payment, now);
  if (charge.status === 'void') {
    await requestRefund(tx, payment, { reason: 'paid-after-cancelling', createdBy: null });
    return;
  }
  await setChargeStatus(tx, chargeId, 'paid');
  const { patientId } = charge;
  const about = { kind: 'receipt', dedupeKey: `receipt:${id}` } as const;
  await enqueueMessage(tx, { ...about, patientId, subject: { paymentId: id }, dueAt: now });
}

/** Settles an attempt once, whatever told of it and however often: webhook, return page or reconciliation. */
export async function settle(tx: Transaction, paid: Paid, now: Date): Promise<void> {
  const found = await attemptOf(tx, paid.attemptId);
  if (!found || found.payment.status === 'settled') return;
  const { charge, payment } = found;
  if (!agrees(paid, payment)) return audit(tx, 'payment.amount-differs', charge, now);
  const earlier = await settledPayment(tx, charge.id);
  if (earlier) return returnSecond(tx, payment, paid, now);
  await receive(tx, found, paid, now);
  await audit(tx, 'payment.settled', charge, now);
}

/** Ends an attempt that nobody paid; one that was paid stays so. */
export async function expire(tx: Transaction, attemptId: string | null): Promise<void> {
  const found = await attemptOf(tx, attemptId);
  if (!found || !['preparing', 'pending'].includes(found.payment.status)) return;
  await updatePayment(tx, found.payment.id, { status: 'expired' });
}

/** The service tells that a payment went back. */
export async function settleRefundOf(
  tx: Transaction,
  {
    attemptId,
    refundedMinor,
  }: { readonly attemptId: string | null; readonly refundedMinor: number },
  now: Date,
): Promise<void> {
  const found = await attemptOf(tx, attemptId);
  if (!found || refundedMinor < found.payment.amountMinor) return;
  const [given] = await tx
    .select({ refund: refunds, payment: payments })
    .from(refunds)
    .innerJoin(payments, eq(payments.id, refunds.paymentId))
    .where(eq(payments.id, found.payment.id));
  if (given) await settleRefund(tx, given, { serviceRefundId: null, now });
}
