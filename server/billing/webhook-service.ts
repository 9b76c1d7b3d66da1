import type { Transaction } from '../database/client';
import { paymentEvents } from '../database/schema';
import type { PaymentEvent } from '../payments/payments';
import { expire, settle, settleRefundOf } from './settling-service';

type Verified = Extract<PaymentEvent, { outcome: 'verified' }>;

/** What an event is about, for the record: ids alone. */
function subjectOf(event: Verified) {
  if (event.kind === 'other') return { objectId: null, attemptId: null };
  if ('session' in event) {
    const { sessionId, attemptId } = event.session;
    return { objectId: sessionId, attemptId };
  }
  return { objectId: event.payment.paymentIntentId, attemptId: event.payment.attemptId };
}

async function apply(tx: Transaction, event: Verified, now: Date): Promise<void> {
  switch (event.kind) {
    case 'checkout-completed':
      return event.session.paid ? settle(tx, event.session, now) : undefined;
    case 'checkout-expired':
      return expire(tx, event.session.attemptId);
    case 'payment-succeeded':
      return settle(tx, event.payment, now);
    case 'charge-refunded':
      return settleRefundOf(tx, { ...event.payment, refundedMinor: event.refundedMinor }, now);
    case 'payment-failed':
    case 'other':
      // A refused card leaves the pay page open for another try.
      return undefined;
  }
}

/** Takes in what the payment service tells: each event once, in any order, in one transaction with its effect. */
export async function takeEvent(tx: Transaction, event: Verified, now: Date): Promise<void> {
  const { objectId, attemptId } = subjectOf(event);
  const { eventId: id, type, createdAt } = event;
  const payload = { attemptId, createdAt: createdAt.toISOString() };
  const added = await tx
    .insert(paymentEvents)
    .values({ id, type, objectId, payload, receivedAt: now })
    .onConflictDoNothing()
    .returning({ id: paymentEvents.id });
  if (added.length > 0) await apply(tx, event, now);
}
