/**
 * What Plimsoll asks of the payment service, in its own words: billing knows these types and
 * nothing of the SDK. Money is integer minor units with an ISO 4217 code in lower case. No card
 * data passes here: a payer enters a card on the service's own page.
 */
export interface Payments {
  /**
   * Opens a hosted pay page for one attempt at one charge. Calling again with the same attempt and
   * the same content gives the same session, also after a crash between call and commit.
   */
  createCheckoutSession(request: CheckoutRequest): Promise<CheckoutSession | PaymentsFailure>;
  /** Reads a session as it stands now: the way to settle what a lost webhook did not tell. */
  retrieveSession(sessionId: string): Promise<CheckoutSession | PaymentsFailure>;
  /** Closes an open session, so that it can no longer be paid. */
  expireSession(sessionId: string): Promise<CheckoutSession | PaymentsFailure>;
  /** Gives back all or part of a payment; the same `refundId` never gives back twice. */
  createRefund(request: RefundRequest): Promise<Refund | PaymentsFailure>;
  /** Reads a refund as it stands now: one may stay pending for days. */
  retrieveRefund(serviceRefundId: string): Promise<Refund | PaymentsFailure>;
  /**
   * Verifies a webhook's signature over the body exactly as received, at most 300 s old, by any of
   * the configured secrets.
   */
  readWebhook(rawBody: Buffer, signature: string | undefined): PaymentEvent | RejectedWebhook;
}

export interface CheckoutRequest {
  /** Opaque id of the charge, the only thing about it that leaves Plimsoll. */
  chargeId: string;
  /** Opaque id of this attempt, stored before the call; the idempotency key. */
  attemptId: string;
  amountMinor: number;
  currency: string;
  /** Where the payer lands after paying; `{CHECKOUT_SESSION_ID}` in it becomes the session's id. */
  successUrl: string;
  cancelUrl: string;
}

export interface RefundRequest {
  /** Opaque id of the refund, stored before the call; the idempotency key. */
  refundId: string;
  chargeId: string;
  paymentIntentId: string;
  amountMinor: number;
}

export interface CheckoutSession {
  outcome: 'session';
  sessionId: string;
  /** The pay page; null once the session is complete or expired. */
  url: string | null;
  status: 'open' | 'complete' | 'expired';
  paid: boolean;
  amountMinor: number;
  currency: string;
  paymentIntentId: string | null;
  chargeId: string | null;
  attemptId: string | null;
}

export interface Refund {
  outcome: 'refund';
  /** The service's id of it. */
  serviceRefundId: string;
  status: 'pending' | 'succeeded' | 'failed';
  amountMinor: number;
  currency: string;
}

/**
 * - `unavailable`: no answer, or the service failed. It may have been done: try again later with
 *   the same id.
 * - `refused`: the service will not do it, however often it is asked; `code` is its own.
 * - `key-reused`: the id was used before for something else.
 * - `not-found`: the service knows no such thing.
 */
export interface PaymentsFailure {
  outcome: 'unavailable' | 'refused' | 'key-reused' | 'not-found';
  code: string | null;
  /** The service's id of the call, for its support; null when nothing was answered. */
  requestId: string | null;
  /** For the log only. */
  detail: string;
}

/** An event whose signature held. The same one may come again, late, and in any order. */
export type PaymentEvent = {
  outcome: 'verified';
  /** The service's id of the event, the same at each delivery. */
  eventId: string;
  type: string;
  createdAt: Date;
} & PaymentEventSubject;

export type PaymentEventSubject =
  | { kind: 'checkout-completed' | 'checkout-expired'; session: CheckoutSession }
  | { kind: 'payment-succeeded' | 'payment-failed'; payment: Payment }
  | { kind: 'charge-refunded'; payment: Payment; refundedMinor: number }
  | { kind: 'other' };

export interface Payment {
  paymentIntentId: string;
  amountMinor: number;
  currency: string;
  chargeId: string | null;
  attemptId: string | null;
}

export interface RejectedWebhook {
  outcome: 'rejected';
  /** For the log only. */
  detail: string;
}
