import type { AppointmentItem, ClassDate } from '@shared/contracts/schedule-contract';
import {
  DEFAULT_BOOKING_WINDOW,
  isLateCancellation,
  takesBookings,
  takesCancellation,
} from '@shared/scheduling/booking-window';
import { type Interval, overlaps } from '@shared/scheduling/intervals';

/** Whose day it is: what the patient holds, how many a day they may, and whether on a monitored place. */
export interface Own {
  readonly appointments: readonly AppointmentItem[];
  readonly dailyLimit: number;
  readonly monitored: boolean;
}

const spanOf = ({ startsAt, endsAt }: { startsAt: string; endsAt: string }): Interval => ({
  startsAt: new Date(startsAt),
  endsAt: new Date(endsAt),
});

/** A session that is still to come, or under way. */
export function isAhead(appointment: AppointmentItem, now: Date): boolean {
  const ahead = ['booked', 'arrived', 'checked-in'].includes(appointment.status);
  return ahead && now < new Date(appointment.endsAt);
}

export function mayCancel(appointment: AppointmentItem, now: Date): boolean {
  const open = takesCancellation(spanOf(appointment), 'patient', now);
  return appointment.status === 'booked' && open;
}

export function isLate(appointment: AppointmentItem, now: Date): boolean {
  return isLateCancellation(spanOf(appointment), now, DEFAULT_BOOKING_WINDOW);
}

/** How many more people like this patient fit in: a monitored patient needs a monitor too. */
export function placesLeft(date: ClassDate, { monitored }: Pick<Own, 'monitored'>): number {
  const places = date.capacity - date.booked;
  if (!monitored || date.kind !== 'exercise') return places;
  return Math.min(places, date.monitoredCapacity - date.monitoredBooked);
}

/** The patient's own appointment in this class, if they hold one. */
export function ownIn(date: ClassDate, { appointments }: Own): AppointmentItem | undefined {
  return appointments.find(
    ({ classDateId, status }) => classDateId === date.id && status === 'booked',
  );
}

/** What of a day the day's limit counts: all but what was cancelled or entered in error. */
function fillsDay({ status }: AppointmentItem): boolean {
  return ['booked', 'arrived', 'checked-in', 'fulfilled', 'noshow'].includes(status);
}

function isDayFull(localDate: string, { appointments, dailyLimit }: Own): boolean {
  const held = appointments.filter((one) => one.localDate === localDate && fillsDay(one));
  return held.length >= dailyLimit;
}

/** What the patient still owes or has paid for a place in this class that they cancelled late; it pays for another. */
export function standingCharge(date: ClassDate, { appointments }: Own): AppointmentItem['charge'] {
  const given = appointments.find(
    ({ classDateId, status, charge }) =>
      classDateId === date.id && status === 'cancelled' && charge !== null,
  );
  return given?.charge ?? null;
}

/** Whether this patient can take a place in this class now, as far as this page can tell. */
export function isBookable(date: ClassDate, own: Own, timeZone: string, now: Date): boolean {
  const span = spanOf(date);
  const open = takesBookings(
    { ...span, localDate: date.localDate },
    'patient',
    now,
    timeZone,
    DEFAULT_BOOKING_WINDOW,
  );
  const busy = own.appointments.some((held) => isAhead(held, now) && overlaps(spanOf(held), span));
  const room = placesLeft(date, own) > 0 && !isDayFull(date.localDate, own);
  return date.status === 'scheduled' && open && !busy && room;
}

/** What a day of the month shows. */
export interface DayState {
  readonly localDate: string;
  /** Classes that can be booked. */
  readonly free: number;
  /** Whether the patient has a session on that day. */
  readonly booked: boolean;
}

/** The days on which there are classes, in order. */
export function dayStates(
  dates: readonly ClassDate[],
  own: Own,
  timeZone: string,
  now: Date,
): DayState[] {
  const days = [...new Set(dates.map(({ localDate }) => localDate))].sort();
  return days.map((localDate) => {
    const classes = dates.filter((date) => date.localDate === localDate);
    return {
      localDate,
      free: classes.filter((date) => isBookable(date, own, timeZone, now)).length,
      booked: classes.some((date) => ownIn(date, own) !== undefined),
    };
  });
}
