import { DEFAULT_BOOKING_WINDOW, isLateCancellation } from '@shared/scheduling/booking-window';
import type { Clock } from './clock';
import type { Visit } from './courses';
import { minutesLater } from './days';
import { dice, idAt } from './dice';
import { storyPaymentId } from './story-payments';
import { priceItemId, selfPayPrice } from './program';
import type { RowOf } from './row-of';
import type { PeopleRows } from './rows';

const currency = selfPayPrice.currency;
const amountMinor = selfPayPrice.amountMinor;

/** When a class is paid: soon after booking, or after the last moment to give the place back, or never so far. */
function paysAt(visit: Visit, owesLast: boolean): Date | null {
  if (owesLast) return minutesLater(visit.startsAt, -14 * 60);
  const draw = dice(visit.key, 'paid');
  if (visit.paysAhead) return minutesLater(visit.bookedAt, draw.whole(4, 6 * 60));
  return draw.chance(0.12) ? null : minutesLater(visit.startsAt, draw.whole(-60, 4 * 24 * 60));
}

interface Posting {
  readonly key: string;
  readonly chargeId: string;
  readonly at: Date;
  readonly debit: 'receivable' | 'cash' | 'income';
  readonly credit: 'receivable' | 'income';
}

/** Two entries that balance. */
function journal({ key, chargeId, at, debit, credit }: Posting): RowOf<'ledgerEntries'>[] {
  const shared = { journalId: idAt(at, 'journal', key), postingKey: key, currency, chargeId, at };
  return [
    {
      id: idAt(at, key, 'debit'),
      ...shared,
      account: debit,
      debitMinor: amountMinor,
      creditMinor: 0,
    },
    {
      id: idAt(at, key, 'credit'),
      ...shared,
      account: credit,
      debitMinor: 0,
      creditMinor: amountMinor,
    },
  ];
}

interface Owing {
  readonly patientId: string;
  readonly appointmentId: string;
  /** Who pays at the page: the patient's account, else the desk by phone. */
  readonly payer: string;
  /** Pays the evening before the class, so that one charge is always open. */
  readonly owesLast: boolean;
}

function settle(rows: PeopleRows, visit: Visit, chargeId: string, payer: string, at: Date): void {
  const id = idAt(at, visit.key, 'payment');
  rows.payments.push({
    id,
    chargeId,
    amountMinor,
    currency,
    status: 'settled',
    serviceSessionId: `cs_test_demo_${id}`,
    serviceSessionUrl: null,
    servicePaymentId: storyPaymentId(id),
    createdBy: payer,
    createdAt: minutesLater(at, -2),
    settledAt: at,
  });
  rows.ledgerEntries.push(
    ...journal({ key: `payment:${id}`, chargeId, at, debit: 'cash', credit: 'receivable' }),
  );
}

/** A place given back late is paid all the same; one that the program took back is not. */
function givenBackAt(visit: Visit): Date | null {
  const { cancelledAt } = visit;
  if (!cancelledAt || visit.cancelledByProgram) return cancelledAt;
  return isLateCancellation(visit, cancelledAt, DEFAULT_BOOKING_WINDOW) ? null : cancelledAt;
}

/** The charge of a self-pay class; void when the place was given back in time. */
export function writeMoney(rows: PeopleRows, visit: Visit, owing: Owing, clock: Clock): void {
  const { patientId, appointmentId, payer, owesLast } = owing;
  const chargeId = idAt(visit.bookedAt, visit.key, 'charge');
  const cancelledAt = givenBackAt(visit);
  const payment = cancelledAt ? null : paysAt(visit, owesLast);
  const paidAt = payment && payment <= clock.now ? payment : null;
  rows.charges.push({
    id: chargeId,
    patientId,
    appointmentId,
    priceItemId: priceItemId(clock.anchor),
    amountMinor,
    currency,
    status: paidAt ? 'paid' : cancelledAt ? 'void' : 'open',
    version: paidAt || cancelledAt ? 2 : 1,
    createdAt: visit.bookedAt,
  });
  rows.ledgerEntries.push(
    ...journal({
      key: `charge:${chargeId}`,
      chargeId,
      at: visit.bookedAt,
      debit: 'receivable',
      credit: 'income',
    }),
  );
  if (paidAt) settle(rows, visit, chargeId, payer, paidAt);
  if (cancelledAt) {
    rows.ledgerEntries.push(
      ...journal({
        key: `void:${chargeId}`,
        chargeId,
        at: cancelledAt,
        debit: 'income',
        credit: 'receivable',
      }),
    );
  }
}
