import { onShelf } from './book';
import type { Desk } from './desk';
import {
  makeId,
  type BalanceTransaction,
  type Charge,
  type PaymentIntent,
  type Refund,
  type Session,
} from './objects';

/** What is kept of a card: never its number. */
export interface Card {
  brand: string;
  last4: string;
}

export interface Decline {
  code: 'card_declined';
  decline_code: 'generic_decline' | 'insufficient_funds' | 'test_mode_live_card';
  message: string;
}

/** Takes the payment of an open session, or notes that the card was declined. */
export function paySession(
  desk: Desk,
  session: Session,
  card: Card,
  decline: Decline | null,
): void {
  const intent = intentOf(desk, session);
  const charge = chargeCard(desk, intent, card, decline);
  intent.latest_charge = charge.id;
  if (decline) {
    intent.status = 'requires_payment_method';
    intent.last_payment_error = { type: 'card_error', ...decline };
    desk.emit('charge.failed', charge, null);
    desk.emit('payment_intent.payment_failed', intent, null);
    return;
  }
  intent.status = 'succeeded';
  intent.amount_received = intent.amount;
  intent.last_payment_error = null;
  session.status = 'complete';
  session.payment_status = 'paid';
  session.url = null;
  desk.emit('charge.succeeded', charge, null);
  desk.emit('payment_intent.succeeded', intent, null);
  desk.emit('checkout.session.completed', session, null);
}

function intentOf(desk: Desk, session: Session): PaymentIntent {
  const known = onShelf(desk.book.paymentIntents, session.payment_intent);
  if (known) return known;
  const details = desk.book.sessionDetails[session.id];
  const intent: PaymentIntent = {
    id: makeId('pi'),
    object: 'payment_intent',
    amount: session.amount_total ?? 0,
    amount_received: 0,
    capture_method: 'automatic_async',
    created: desk.now(),
    currency: session.currency ?? 'usd',
    customer: null,
    description: details?.description ?? null,
    last_payment_error: null,
    latest_charge: null,
    livemode: false,
    metadata: details?.intentMetadata ?? {},
    payment_method: null,
    payment_method_types: ['card'],
    status: 'processing',
  };
  desk.book.paymentIntents[intent.id] = intent;
  session.payment_intent = intent.id;
  desk.emit('payment_intent.created', intent, null);
  return intent;
}

export function chargeCard(
  desk: Desk,
  intent: PaymentIntent,
  card: Card,
  decline: Decline | null,
): Charge {
  const paid = decline === null;
  intent.payment_method = makeId('pm');
  const charge: Charge = {
    id: makeId('ch'),
    object: 'charge',
    amount: intent.amount,
    amount_captured: paid ? intent.amount : 0,
    amount_refunded: 0,
    balance_transaction: null,
    captured: paid,
    created: desk.now(),
    currency: intent.currency,
    customer: null,
    description: intent.description,
    disputed: false,
    failure_code: decline?.code ?? null,
    failure_message: decline?.message ?? null,
    livemode: false,
    metadata: { ...intent.metadata },
    paid,
    payment_intent: intent.id,
    payment_method: intent.payment_method,
    payment_method_details: { type: 'card', card },
    refunded: false,
    status: paid ? 'succeeded' : 'failed',
  };
  desk.book.charges[charge.id] = charge;
  if (paid) charge.balance_transaction = enterBalance(desk, 'charge', charge.amount, charge);
  return charge;
}

/** Enters a movement of money, without a fee: a stand-in has no price list. Answers its id. */
export function enterBalance(
  desk: Desk,
  type: 'charge' | 'refund',
  amount: number,
  source: Charge | Refund,
): string {
  const entry: BalanceTransaction = {
    id: makeId('txn'),
    object: 'balance_transaction',
    amount,
    available_on: desk.now(),
    created: desk.now(),
    currency: source.currency,
    description: null,
    fee: 0,
    fee_details: [],
    net: amount,
    reporting_category: type,
    source: source.id,
    status: 'available',
    type,
  };
  desk.book.balanceTransactions[entry.id] = entry;
  return entry.id;
}
