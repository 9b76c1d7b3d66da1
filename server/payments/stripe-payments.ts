import Stripe from 'stripe';
import type { PaymentConfig } from '../config';
import type {
  CheckoutRequest,
  CheckoutSession,
  Payments,
  PaymentsFailure,
  Refund,
  RefundRequest,
} from './payments';
import { readSession } from './session-view';
import { createWebhookReader } from './webhook-reader';

const longestTimeout = 10_000;
const retries = 2;

/**
 * Payments through the official SDK, to the real service or to the stand-in that the config names.
 * @param timeoutMs milliseconds for each of at most three tries, at most 10 000
 * @throws Error when a live key would be sent to a stand-in
 */
export function createPayments(config: PaymentConfig, timeoutMs = longestTimeout): Payments {
  if (config.endpoint && config.secretKey.includes('_live_')) {
    throw new Error('A payment stand-in takes a test key only (sk_test_…).');
  }
  const stripe = new Stripe(config.secretKey, {
    timeout: Math.min(timeoutMs, longestTimeout),
    maxNetworkRetries: retries,
    telemetry: false,
    ...(config.endpoint ? { ...config.endpoint, protocol: 'http' } : {}),
  });
  return {
    createCheckoutSession: (request) => openSession(stripe, request),
    retrieveSession: (id) =>
      settled(async () => readSession(await stripe.checkout.sessions.retrieve(id))),
    expireSession: (id) =>
      settled(async () => readSession(await stripe.checkout.sessions.expire(id))),
    createRefund: (request) => refund(stripe, request),
    retrieveRefund: (id) => settled(async () => readRefund(await stripe.refunds.retrieve(id))),
    readWebhook: createWebhookReader(config.webhookSecrets),
  };
}

function openSession(
  stripe: Stripe,
  request: CheckoutRequest,
): Promise<CheckoutSession | PaymentsFailure> {
  // Ids and the one word "Payment" are all that the service learns: no program, class or person.
  const metadata = { charge_id: request.chargeId, attempt_id: request.attemptId };
  return settled(async () =>
    readSession(
      await stripe.checkout.sessions.create(
        {
          mode: 'payment',
          line_items: [
            {
              quantity: 1,
              price_data: {
                currency: request.currency.toLowerCase(),
                unit_amount: request.amountMinor,
                product_data: { name: 'Payment' },
              },
            },
          ],
          success_url: request.successUrl,
          cancel_url: request.cancelUrl,
          client_reference_id: request.chargeId,
          metadata,
          payment_intent_data: { metadata },
        },
        { idempotencyKey: request.attemptId },
      ),
    ),
  );
}

function refund(stripe: Stripe, request: RefundRequest): Promise<Refund | PaymentsFailure> {
  return settled(async () => {
    const made = await stripe.refunds.create(
      {
        payment_intent: request.paymentIntentId,
        amount: request.amountMinor,
        reason: 'requested_by_customer',
        metadata: { charge_id: request.chargeId, refund_id: request.refundId },
      },
      { idempotencyKey: request.refundId },
    );
    return readRefund(made);
  });
}

const readRefund = ({ id, status, amount, currency }: Stripe.Refund): Refund => ({
  outcome: 'refund',
  serviceRefundId: id,
  status: refundStatus(status),
  amountMinor: amount,
  currency,
});

function refundStatus(status: string | null): Refund['status'] {
  if (status === 'succeeded') return 'succeeded';
  return status === 'failed' || status === 'canceled' ? 'failed' : 'pending';
}

/**
 * Turns the SDK's errors into outcomes. A wrong or unauthorised key is thrown on: nobody at the
 * desk can mend it, and it must be seen.
 */
async function settled<T>(call: () => Promise<T>): Promise<T | PaymentsFailure> {
  try {
    return await call();
  } catch (error) {
    if (
      !(error instanceof Stripe.errors.StripeError) ||
      error instanceof Stripe.errors.StripeAuthenticationError ||
      error instanceof Stripe.errors.StripePermissionError
    ) {
      throw error;
    }
    return {
      outcome: outcomeOf(error),
      code: error.code ?? null,
      requestId: error.requestId ?? null,
      detail: error.message,
    };
  }
}

function outcomeOf(error: Stripe.errors.StripeError): PaymentsFailure['outcome'] {
  if (error instanceof Stripe.errors.StripeIdempotencyError) return 'key-reused';
  if (error.code === 'resource_missing') return 'not-found';
  return error instanceof Stripe.errors.StripeInvalidRequestError ||
    error instanceof Stripe.errors.StripeCardError
    ? 'refused'
    : 'unavailable';
}
