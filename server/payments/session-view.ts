import type Stripe from 'stripe';
import type { CheckoutSession, Payment } from './payments';

/** The id of a reference that the service may give whole. */
export function idOf(reference: string | { id: string } | null | undefined): string | null {
  return typeof reference === 'string' ? reference : (reference?.id ?? null);
}

/** The ids that we gave along, as far as they are there: others may use the same account. */
export function ourIds(metadata: Stripe.Metadata | null): Pick<Payment, 'chargeId' | 'attemptId'> {
  return {
    chargeId: metadata?.['charge_id'] ?? null,
    attemptId: metadata?.['attempt_id'] ?? null,
  };
}

function statusOf(status: string | null): CheckoutSession['status'] {
  return status === 'complete' || status === 'expired' ? status : 'open';
}

/** A session of the service in our words. */
export function readSession(session: Stripe.Checkout.Session): CheckoutSession {
  return {
    outcome: 'session',
    sessionId: session.id,
    url: session.url,
    status: statusOf(session.status),
    paid: session.payment_status === 'paid',
    amountMinor: session.amount_total ?? 0,
    currency: session.currency ?? '',
    paymentIntentId: idOf(session.payment_intent),
    ...ourIds(session.metadata),
  };
}
