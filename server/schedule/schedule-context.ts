import {
  DEFAULT_BOOKING_WINDOW,
  takesBookings,
  type Booker,
  type BookingWindow,
  type DatedClass,
} from '@shared/scheduling/booking-window';
import type { Role } from '@shared/contracts/accounts-contract';
import type { AppContext } from '../app-context';
import type { Transaction } from '../database/client';
import type { AppointmentEvent, AppointmentFacts, AppointmentListener } from './appointment-events';
import type { BookedRow } from './booking-repository';

/** Who acts: a member of staff, a patient for themselves. */
export interface ScheduleActor {
  readonly id: string;
  readonly roles: readonly Role[];
}

/** What every change of attendance works with. */
export interface ScheduleContext {
  readonly actor: ScheduleActor;
  readonly now: Date;
  readonly window: BookingWindow;
  readonly listeners: readonly AppointmentListener[];
}

/** The context of one call. */
export function scheduleContext(
  call: { readonly actor: ScheduleActor; readonly context: Pick<AppContext, 'clock'> },
  listeners: readonly AppointmentListener[],
): ScheduleContext {
  const { actor, context } = call;
  return { actor, now: context.clock.now(), window: DEFAULT_BOOKING_WINDOW, listeners };
}

export function bookerOf(actor: ScheduleActor): Booker {
  return actor.roles.some((role) => role !== 'patient') ? 'staff' : 'patient';
}

/** Whether a class takes bookings from this person now. */
export function isOpen(context: ScheduleContext, date: DatedClass, timeZone: string): boolean {
  return takesBookings(date, bookerOf(context.actor), context.now, timeZone, context.window);
}

function factsOf(row: BookedRow): AppointmentFacts {
  const { priceItemId, priceName, amountMinor, currency } = row;
  const priced =
    priceItemId !== null && priceName !== null && amountMinor !== null && currency !== null;
  return {
    appointmentId: row.id,
    classDateId: row.classDateId,
    patientId: row.patientId,
    enrollmentId: row.enrollmentId,
    siteId: row.siteId,
    className: row.className,
    startsAt: row.startsAt,
    endsAt: row.endsAt,
    localDate: row.localDate,
    timeZone: row.timeZone,
    price: priced ? { priceItemId, name: priceName, amountMinor, currency } : null,
  };
}

/** Tells every listener, in its order, inside the transaction. */
async function announce(
  tx: Transaction,
  context: ScheduleContext,
  event: AppointmentEvent,
): Promise<void> {
  for (const listener of context.listeners) {
    await listener(tx, event, { actorId: context.actor.id, at: context.now });
  }
}

/** Tells of places taken, a whole series at once. @param rows earliest first */
export async function announceBooked(
  tx: Transaction,
  context: ScheduleContext,
  rows: readonly BookedRow[],
): Promise<void> {
  const [first, ...rest] = rows.map(factsOf);
  if (first) await announce(tx, context, { type: 'booked', appointments: [first, ...rest] });
}

/** Tells of a place given back. */
export async function announceCancelled(
  tx: Transaction,
  context: ScheduleContext,
  row: BookedRow,
  how: { readonly byProgram: boolean; readonly late: boolean },
): Promise<void> {
  await announce(tx, context, { type: 'cancelled', appointment: factsOf(row), ...how });
}
