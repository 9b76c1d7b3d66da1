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
  updateUndecided,
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
  { actor, now }: { readonly actor: Actor; readonly now: Date },
  chargeId: string,
  shown: Shown,
): Promise<PaymentRow | Failure> {
  return inTransaction(database, async (tx) => {
    const charge = await lockCharge(tx, chargeId);
    if (!charge) return fail('not-found');
    if (charge.status !== 'open') return fail('charge-not-open');
    const same = charge.amountMinor === shown.amountMinor && charge.currency === shown.currency;
    if (!same) return fail('price-changed');
    return (
      (await liveAttempt(tx, chargeId)) ??
      insertAttempt(tx, charge, { createdBy: actor.id, createdAt: now })
    );
  });
}

/** The attempt's session as the service has it. Its id is the idempotency key: asking again makes no second one. */
async function sessionOf(
  payments: Payments,
  origin: string,
  { id, chargeId, amountMinor, currency, serviceSessionId }: PaymentRow,
): Promise<CheckoutSession | PaymentsFailure> {
  if (serviceSessionId !== null) return payments.retrieveSession(serviceSessionId);
  const back = `${origin}/payments/${chargeId}`;
  return payments.createCheckoutSession({
    chargeId,
    attemptId: id,
    amountMinor,
    currency: currency.toLowerCase(),
    successUrl: `${back}?paid=yes`,
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
    const opened = { status: 'pending', serviceSessionId, serviceSessionUrl } as const;
    return updateUndecided(tx, attemptId, opened);
  });
}

async function giveUp({ database }: AppContext, attemptId: string): Promise<void> {
  await inTransaction(database, (tx) => updateUndecided(tx, attemptId, { status: 'failed' }));
}

/**
 * What the service keeps failing under one idempotency key it fails for good, so a new attempt takes over. A page that was
 * made all the same is known to nobody; if it were paid, the second payment would go back.
 */
const STUCK_MS = 30_000;

const isStuck = ({ serviceSessionId, createdAt }: PaymentRow, now: Date): boolean =>
  serviceSessionId === null && now.getTime() - createdAt.getTime() > STUCK_MS;

/** Asks how an attempt stands and writes it down; one of which the service wants to know nothing is given up. */
export async function resolveAttempt(
  context: AppContext,
  payments: Payments,
  attempt: PaymentRow,
): Promise<CheckoutSession | null> {
  const session = await sessionOf(payments, context.settings.origin, attempt);
  if (session.outcome === 'session') {
    await note(context, attempt.id, session);
    return session;
  }
  context.log.warn({ attemptId: attempt.id, outcome: session.outcome }, 'attempt undecided');
  const hopeless = session.outcome !== 'unavailable' || isStuck(attempt, context.clock.now());
  if (hopeless) await giveUp(context, attempt.id);
  return null;
}

const BUSY = 'The payment page did not answer. Nothing was paid; try again in a moment.';

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
    const attempt = await prepare(database, { actor, now: context.clock.now() }, chargeId, shown);
    if (attempt instanceof Failure) return attempt;
    const session = await resolveAttempt(context, payments, attempt);
    if (session === null) break;
    if (session.paid || session.status === 'complete') return fail('charge-not-open');
    if (session.url !== null) return session.url;
  }
  return fail('unavailable', { title: BUSY, retryAfterSeconds: 5 });
}
