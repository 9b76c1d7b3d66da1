import { randomBytes } from 'node:crypto';
import type Stripe from 'stripe';

/**
 * The parts of the service's objects that the stand-in keeps: names and types are the SDK's own,
 * so that what it answers is what the SDK says it answers. References are ids, never expanded here.
 */
type Kept<T, Key extends keyof T, Reference extends string = never> = Pick<
  T,
  Exclude<Key, Reference>
> &
  Record<Reference, string | null>;

export type Session = Kept<
  Stripe.Checkout.Session,
  | 'id'
  | 'object'
  | 'amount_subtotal'
  | 'amount_total'
  | 'cancel_url'
  | 'client_reference_id'
  | 'created'
  | 'currency'
  | 'customer_email'
  | 'expires_at'
  | 'livemode'
  | 'metadata'
  | 'mode'
  | 'payment_method_types'
  | 'payment_status'
  | 'status'
  | 'success_url'
  | 'ui_mode'
  | 'url',
  'payment_intent' | 'customer'
>;

export type PaymentIntent = Kept<
  Stripe.PaymentIntent,
  | 'id'
  | 'object'
  | 'amount'
  | 'amount_received'
  | 'capture_method'
  | 'created'
  | 'currency'
  | 'description'
  | 'livemode'
  | 'metadata'
  | 'payment_method_types'
  | 'status',
  'customer' | 'latest_charge' | 'payment_method'
> & { last_payment_error: Pick<Stripe.PaymentIntent.LastPaymentError, FailureKey> | null };

type FailureKey = 'type' | 'code' | 'decline_code' | 'message';

export type Charge = Kept<
  Stripe.Charge,
  | 'id'
  | 'object'
  | 'amount'
  | 'amount_captured'
  | 'amount_refunded'
  | 'captured'
  | 'created'
  | 'currency'
  | 'description'
  | 'disputed'
  | 'failure_code'
  | 'failure_message'
  | 'livemode'
  | 'metadata'
  | 'paid'
  | 'refunded'
  | 'status',
  'balance_transaction' | 'customer' | 'payment_intent' | 'payment_method'
> & { payment_method_details: { type: 'card'; card: { brand: string; last4: string } } };

export type Refund = Kept<
  Stripe.Refund,
  'id' | 'object' | 'amount' | 'created' | 'currency' | 'metadata' | 'reason' | 'status',
  'balance_transaction' | 'charge' | 'payment_intent'
>;

export type BalanceTransaction = Kept<
  Stripe.BalanceTransaction,
  | 'id'
  | 'object'
  | 'amount'
  | 'available_on'
  | 'created'
  | 'currency'
  | 'description'
  | 'fee'
  | 'fee_details'
  | 'net'
  | 'reporting_category'
  | 'status'
  | 'type',
  'source'
>;

/** Events carry a copy of their object, as it stood when they happened. */
export interface ServiceEvent {
  id: string;
  object: 'event';
  api_version: string;
  created: number;
  data: { object: unknown; previous_attributes?: Record<string, unknown> };
  livemode: false;
  pending_webhooks: number;
  request: { id: string | null; idempotency_key: string | null };
  type: string;
}

/** The version of the API whose shapes these are: the one that the SDK is made for. */
export const apiVersion = '2026-10-28.endive';

/** An id like the service's own: a prefix and 24 letters and digits. */
export function makeId(prefix: string): string {
  return `${prefix}_${randomBytes(18).toString('base64url').replace(/[-_]/g, '0')}`;
}
