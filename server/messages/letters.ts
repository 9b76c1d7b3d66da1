import { bookingCancellation } from '../../emails/booking-cancellation';
import { bookingConfirmation } from '../../emails/booking-confirmation';
import { receipt } from '../../emails/receipt';
import { reminder } from '../../emails/reminder';
import type { RenderedEmail } from '../../emails/template';
import { DEFAULT_BOOKING_WINDOW } from '@shared/scheduling/booking-window';
import { reminderDueAt } from '@shared/scheduling/reminder-time';
import type { Transaction } from '../database/client';
import { findReceived, readBookings, type Booking, type PatientRecipient } from './letters-queries';
import type { ClaimedMessage } from './outbox-repository';
import { issueUnsubscribing } from './preferences-service';

/** What a message needs to be written. */
export interface Writing {
  readonly tx: Transaction;
  readonly message: ClaimedMessage;
  readonly now: Date;
  /** Scheme, host and port that links begin with. */
  readonly origin: string;
  readonly senderName: string;
}

/** A letter is rendered outside the transaction that read what it tells. */
export type Written =
  | {
      readonly outcome: 'letter';
      readonly render: () => Promise<RenderedEmail>;
      readonly headers?: Readonly<Record<string, string>>;
    }
  /** There is nothing left to tell: it was cancelled, moved or is past. */
  | { readonly outcome: 'overtaken' }
  /** What it tells of was moved to a later day. */
  | { readonly outcome: 'later'; readonly dueAt: Date };

type PatientLetter = (writing: Writing, recipient: PatientRecipient) => Promise<Written>;

const OVERTAKEN: Written = { outcome: 'overtaken' };
const HOUR = 3_600_000;

async function bookingsOf({ tx, message }: Writing): Promise<Booking[]> {
  const { appointmentIds = '', appointmentId = appointmentIds } = message.subject;
  return readBookings(tx, message.patientId ?? '', appointmentId.split(' ').filter(Boolean));
}

const appointmentsPath = '/my/sessions';

function propsOf(
  { origin, senderName }: Writing,
  { firstName }: PatientRecipient,
  [first, ...rest]: readonly [Booking, ...Booking[]],
) {
  const span = ({ startsAt, endsAt }: Booking) => ({
    startsAt: startsAt.toISOString(),
    endsAt: endsAt.toISOString(),
  });
  return {
    firstName,
    sender: { name: senderName, phone: first.phone },
    appointments: [span(first), ...rest.map(span)] as const,
    timeZone: first.timeZone,
    place: first.address.split('\n'),
    link: `${origin}${appointmentsPath}`,
  };
}

/** Those that still concern the patient, or null when none does. */
function among(
  bookings: readonly Booking[],
  now: Date,
  statuses: readonly Booking['status'][],
): readonly [Booking, ...Booking[]] | null {
  const left = bookings.filter(
    ({ status, startsAt }) => statuses.includes(status) && startsAt > now,
  );
  const [first, ...rest] = left;
  return first ? [first, ...rest] : null;
}

/** Until when one place may be given back in time; a series has as many such moments as dates. */
function cancelUntil([first, ...rest]: readonly [Booking, ...Booking[]], now: Date): string | null {
  const { lateCancellationHours } = DEFAULT_BOOKING_WINDOW;
  const until = new Date(first.startsAt.getTime() - lateCancellationHours * HOUR);
  return rest.length === 0 && until > now ? until.toISOString() : null;
}

const confirmation: PatientLetter = async (writing, recipient) => {
  const booked = among(await bookingsOf(writing), writing.now, ['booked']);
  if (!booked) return OVERTAKEN;
  const props = {
    ...propsOf(writing, recipient, booked),
    cancelUntil: cancelUntil(booked, writing.now),
  };
  return { outcome: 'letter', render: () => bookingConfirmation.render(props) };
};

const cancellation: PatientLetter = async (writing, recipient) => {
  const gone = among(await bookingsOf(writing), writing.now, ['cancelled', 'entered-in-error']);
  if (!gone) return OVERTAKEN;
  const own = recipient.userId !== null && gone[0].cancelledBy === recipient.userId;
  const by = own ? ('patient' as const) : ('staff' as const);
  const props = { ...propsOf(writing, recipient, gone), by };
  return { outcome: 'letter', render: () => bookingCancellation.render(props) };
};

/** Who stops reminders from here gets none any more: `sending-service` asks before it writes. */
const reminding: PatientLetter = async (writing, recipient) => {
  const booked = among(await bookingsOf(writing), writing.now, ['booked']);
  if (!booked) return OVERTAKEN;
  const dueAt = reminderDueAt(booked[0].startsAt, recipient.timeZone);
  if (dueAt > writing.now) return { outcome: 'later', dueAt };
  const { tx, origin, now } = writing;
  const { link, headers } = await issueUnsubscribing(tx, { patientId: recipient.id, origin, now });
  const props = { ...propsOf(writing, recipient, booked), unsubscribeLink: link };
  return { outcome: 'letter', headers, render: () => reminder.render(props) };
};

const receiving: PatientLetter = async ({ tx, message, origin, senderName }, recipient) => {
  const payment = await findReceived(tx, message.subject['paymentId'] ?? '');
  if (!payment?.settledAt) return OVERTAKEN;
  const { id, amountMinor, currency, settledAt } = payment;
  const { firstName, phone, timeZone } = recipient;
  const props = {
    firstName,
    sender: { name: senderName, phone },
    receiptNumber: id.slice(-12).toUpperCase(),
    amountMinor,
    currency,
    paidAt: settledAt.toISOString(),
    timeZone,
    link: `${origin}/my/payments`,
  };
  return { outcome: 'letter', render: () => receipt.render(props) };
};

/** What patients are told, by kind. */
export const patientLetters: Readonly<Record<string, PatientLetter>> = {
  'booking-confirmation': confirmation,
  'booking-cancellation': cancellation,
  reminder: reminding,
  receipt: receiving,
};
