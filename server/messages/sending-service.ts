import type { UndeliveredReason } from '@shared/contracts/messages-contract';
import { findUserForLink } from '../accounts/link-recipient-queries';
import type { AppContext } from '../app-context';
import type { Transaction } from '../database/client';
import { inTransaction } from '../database/transaction';
import type { Mailer, MailOutcome } from '../mail/mailer';
import { accountLetters } from './account-letters';
import { patientLetters, type Writing, type Written } from './letters';
import { findPatientRecipient } from './letters-queries';
import {
  claimMessage,
  isSuppressed,
  markEnded,
  markSent,
  postpone,
  suppress,
  type ClaimedMessage,
} from './outbox-repository';
import { isDeclined } from './preferences-service';

const MINUTE = 60_000;
const FIRST_WAIT_MS = MINUTE;
const LONGEST_WAIT_MS = 15 * MINUTE;
/** A mail server that is away for longer needs a person, and so do those who wait for a message. */
const GIVE_UP_MS = 48 * 60 * MINUTE;

/** One minute, then twice as long each time up to fifteen, give or take a quarter so that all do not come back at once. */
export function waitAfter(attempts: number, chance: number): number {
  const wait = Math.min(FIRST_WAIT_MS * 2 ** (attempts - 1), LONGEST_WAIT_MS);
  return Math.round(wait * (0.75 + chance / 2));
}

interface Addressed {
  readonly to: string | null;
  readonly write: () => Promise<Written>;
}

async function address(writing: Writing): Promise<Addressed | null> {
  const { tx, message } = writing;
  const forPatient = patientLetters[message.kind];
  if (forPatient && message.patientId) {
    const patient = await findPatientRecipient(tx, message.patientId);
    return patient ? { to: patient.email, write: () => forPatient(writing, patient) } : null;
  }
  const forAccount = accountLetters[message.kind];
  const user = message.userId ? await findUserForLink(tx, message.userId) : undefined;
  return forAccount && user ? { to: user.email, write: () => forAccount(writing, user) } : null;
}

type Letter = Extract<Written, { outcome: 'letter' }> & { readonly to: string };

async function refusal(tx: Transaction, to: string | null): Promise<UndeliveredReason | null> {
  if (to === null) return 'no-address';
  return (await isSuppressed(tx, to)) ? 'address-refused-before' : null;
}

/** Reads again what the message tells of; what cannot or need not be told is put aside. */
async function prepare(writing: Writing): Promise<Letter | null> {
  const { tx, message } = writing;
  if (await isDeclined(tx, message)) {
    await markEnded(tx, message.id, { status: 'cancelled', reason: 'declined' });
    return null;
  }
  const addressed = await address(writing);
  const reason = addressed && (await refusal(tx, addressed.to));
  if (!addressed?.to || reason) {
    await markEnded(tx, message.id, { status: 'cancelled', reason: reason ?? 'overtaken' });
    return null;
  }
  const written = await addressed.write();
  if (written.outcome === 'letter') return { ...written, to: addressed.to };
  if (written.outcome === 'later') {
    await postpone(tx, message, { status: 'pending', until: written.dueAt });
    return null;
  }
  await markEnded(tx, message.id, { status: 'cancelled', reason: 'overtaken' });
  return null;
}

async function tryAgain(
  tx: Transaction,
  message: ClaimedMessage,
  status: 'pending' | 'uncertain',
  now: Date,
): Promise<void> {
  if (now.getTime() - message.dueAt.getTime() > GIVE_UP_MS) {
    return markEnded(tx, message.id, { status: 'failed', reason: 'not-reached' });
  }
  const wait = waitAfter(message.attempts, Math.random());
  await postpone(tx, message, { status, until: new Date(now.getTime() + wait) });
}

async function refused(
  tx: Transaction,
  message: ClaimedMessage,
  to: string,
  reason: Extract<MailOutcome, { outcome: 'permanent' }>['reason'],
): Promise<void> {
  if (reason === 'recipient-refused') await suppress(tx, to, reason);
  const ofAddress = reason === 'recipient-refused' || reason === 'invalid-address';
  const told = ofAddress ? 'address-refused' : 'message-refused';
  await markEnded(tx, message.id, { status: 'failed', reason: told });
}

function note(
  tx: Transaction,
  { message, to, now }: { message: ClaimedMessage; to: string; now: Date },
  outcome: MailOutcome,
): Promise<void> {
  switch (outcome.outcome) {
    case 'sent':
      return markSent(tx, message.id, now);
    case 'permanent':
      return refused(tx, message, to, outcome.reason);
    case 'temporary':
      return tryAgain(tx, message, 'pending', now);
    case 'uncertain':
      // Told twice is better than never; the repeat carries the same Message-ID.
      return tryAgain(tx, message, 'uncertain', now);
  }
}

async function deliver(
  context: AppContext,
  mailer: Mailer,
  message: ClaimedMessage,
  { to, render, headers = {} }: Letter,
): Promise<void> {
  const outcome = await mailer.send({ outboxId: message.id, to, headers, ...(await render()) });
  if (outcome.outcome !== 'sent') {
    const { outcome: what } = outcome;
    context.log.warn({ outboxId: message.id, kind: message.kind, outcome: what }, 'mail not sent');
  }
  const told = { message, to, now: context.clock.now() };
  await inTransaction(context.database, (tx) => note(tx, told, outcome));
}

/**
 * Sends one message of the outbox, if it is due and nobody else holds it. Two short transactions, none of them open while
 * the mail server is spoken with: the first claims it and reads the facts again, the second writes down what became of it.
 */
export async function sendMessage(context: AppContext, outboxId: string): Promise<void> {
  const { mailer, database, clock, settings } = context;
  if (!mailer) return;
  const prepared = await inTransaction(database, async (tx) => {
    const now = clock.now();
    const message = await claimMessage(tx, outboxId, now);
    if (!message) return null;
    const { origin } = settings;
    const writing = { tx, message, now, origin, senderName: mailer.senderName };
    const letter = await prepare(writing);
    return letter && { message, letter };
  });
  if (prepared) await deliver(context, mailer, prepared.message, prepared.letter);
}
