import type { Actor } from '../accounts/actor';
import type { AppContext } from '../app-context';
import type { Database } from '../database/client';
import { inTransaction } from '../database/transaction';
import { fail, Failure } from '../http/failure';
import type { CheckoutSession, Payments, PaymentsFailure } from '../payments/payments';
import {
  insertAttempt,
  liveAttempt,
  lockCharge,
  updatePayment,
  type PaymentRow,
} from './charges-repository';
import { expire, settle } from './settling-service';

export interface Shown {
  readonly amountMinor: number;
  readonly currency: string;
}

/** The attempt that is under way, else a new one: committed before the service is asked. */
async function prepare(
  database: Database,
  actor: Actor,
  chargeId: string,
  shown: Shown,
): Promise<PaymentRow | Failure> {
  return inTransaction(database, async (tx) => {
    const charge = await lockCharge(tx, chargeId);
    if (!charge) return fail('not-found');
    if (charge.status !== 'open') return fail('charge-not-open');
    const same = charge.amountMinor === shown.amountMinor && charge.currency === shown.currency;
    if (!same) return fail('price-changed');
    return (await liveAttempt(tx, chargeId)) ?? insertAttempt(tx, charge, actor.id);
  });
}

/** The attempt's session as the service has it. Its id is the idempotency key: asking again makes no second one. */
export async function sessionOf(
  payments: Payments,
  origin: string,
  { id, chargeId, amountMinor, currency, serviceSessionId }: PaymentRow,
): Promise<CheckoutSession | PaymentsFailure> {
  if (serviceSessionId !== null) return payments.retrieveSession(serviceSessionId);
  const back = `${origin}/my/payments`;
  return payments.createCheckoutSession({
    chargeId,
    attemptId: id,
    amountMinor,
    currency: currency.toLowerCase(),
    successUrl: `${back}?paid=${chargeId}`,
    cancelUrl: back,
  });
}

/** Writes down what the service says of an attempt; a paid one is settled. */
export async function note(
  { database, clock }: AppContext,
  attemptId: string,
  session: CheckoutSession,
): Promise<void> {
  const now = clock.now();
  await inTransaction(database, async (tx) => {
    if (session.paid) return settle(tx, { ...session, attemptId }, now);
    if (session.status === 'expired') return expire(tx, attemptId);
    const { sessionId: serviceSessionId, url: serviceSessionUrl } = session;
    return updatePayment(tx, attemptId, { status: 'pending', serviceSessionId, serviceSessionUrl });
  });
}

async function giveUp({ database }: AppContext, attemptId: string): Promise<void> {
  await inTransaction(database, (tx) => updatePayment(tx, attemptId, { status: 'failed' }));
}

const BUSY = 'The payment page did not answer. Nothing was paid; try again in a moment.';

async function open(
  context: AppContext,
  payments: Payments,
  attempt: PaymentRow,
): Promise<CheckoutSession | Failure> {
  const session = await sessionOf(payments, context.settings.origin, attempt);
  if (session.outcome === 'session') {
    await note(context, attempt.id, session);
    return session;
  }
  context.log.warn({ attemptId: attempt.id, outcome: session.outcome }, 'checkout refused');
  if (session.outcome !== 'unavailable') await giveUp(context, attempt.id);
  return fail('unavailable', { title: BUSY, retryAfterSeconds: 5 });
}

/**
 * Leads to the pay page of a charge. However many ask at once, one attempt is under way and all get its page; an
 * expired page is followed by one new attempt.
 * @param shown what the payer saw
 * @returns the address, or `not-found`, `charge-not-open`, `price-changed`, `unavailable`
 */
export async function checkOut(
  context: AppContext,
  actor: Actor,
  chargeId: string,
  shown: Shown,
): Promise<string | Failure> {
  const { payments, database } = context;
  if (!payments) return fail('unavailable', { title: 'Paying online is not set up here.' });
  for (const _ of ['the attempt under way', 'a new one']) {
    const attempt = await prepare(database, actor, chargeId, shown);
    if (attempt instanceof Failure) return attempt;
    const session = await open(context, payments, attempt);
    if (session instanceof Failure) return session;
    if (session.paid) return fail('charge-not-open');
    if (session.url !== null) return session.url;
  }
  return fail('unavailable', { title: BUSY, retryAfterSeconds: 5 });
}
