import Stripe from 'stripe';
import type { Payment, PaymentEvent, PaymentEventSubject, Payments } from './payments';
import { idOf, ourIds, readSession } from './session-view';

/** Seconds that a signature stays good: the service's own default. */
const tolerance = 300;

/** Reads webhooks signed by any of these secrets. */
export function createWebhookReader(secrets: readonly string[]): Payments['readWebhook'] {
  return (rawBody, signature) => {
    let detail = 'No signature.';
    for (const secret of secrets) {
      try {
        return readEvent(
          Stripe.webhooks.constructEvent(rawBody, signature ?? '', secret, tolerance),
        );
      } catch (error) {
        if (!isUnreadable(error)) throw error;
        detail = error.message;
      }
    }
    return { outcome: 'rejected', detail };
  };
}

/** A signature that does not hold, or a signed body that is not JSON. */
function isUnreadable(error: unknown): error is Error {
  return (
    error instanceof Stripe.errors.StripeSignatureVerificationError || error instanceof SyntaxError
  );
}

function readEvent(event: Stripe.Event): PaymentEvent {
  return {
    outcome: 'verified',
    eventId: event.id,
    type: event.type,
    createdAt: new Date(event.created * 1000),
    ...subjectOf(event),
  };
}

function subjectOf(event: Stripe.Event): PaymentEventSubject {
  switch (event.type) {
    case 'checkout.session.completed':
    case 'checkout.session.async_payment_succeeded':
      return { kind: 'checkout-completed', session: readSession(event.data.object) };
    case 'checkout.session.expired':
      return { kind: 'checkout-expired', session: readSession(event.data.object) };
    case 'payment_intent.succeeded':
      return { kind: 'payment-succeeded', payment: paymentOf(event.data.object) };
    case 'payment_intent.payment_failed':
      return { kind: 'payment-failed', payment: paymentOf(event.data.object) };
    case 'charge.refunded':
      return refundedOf(event.data.object);
    default:
      return { kind: 'other' };
  }
}

function paymentOf(intent: Stripe.PaymentIntent): Payment {
  return {
    paymentIntentId: intent.id,
    amountMinor: intent.amount,
    currency: intent.currency,
    ...ourIds(intent.metadata),
  };
}

/** `refundedMinor` is all that was given back so far, not this refund alone. */
function refundedOf(charge: Stripe.Charge): PaymentEventSubject {
  const paymentIntentId = idOf(charge.payment_intent);
  if (paymentIntentId === null) return { kind: 'other' };
  return {
    kind: 'charge-refunded',
    refundedMinor: charge.amount_refunded,
    payment: {
      paymentIntentId,
      amountMinor: charge.amount,
      currency: charge.currency,
      ...ourIds(charge.metadata),
    },
  };
}
