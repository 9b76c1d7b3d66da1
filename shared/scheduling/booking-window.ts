import { addDays, daysBetween, localDateAt } from './wall-time';
import type { Interval } from './intervals';

/** Until when patients and staff may book and cancel; a program's own policy may replace these. */
export interface BookingWindow {
  /** Local days ahead that a patient may book. */
  readonly patientDaysAhead: number;
  /** Hours before the start inside which a patient's cancellation counts as late. */
  readonly lateCancellationHours: number;
}

/**
 * Common practice, from memory: programs let patients plan about a quarter ahead, and count a cancellation of the last day as
 * late, since the place is seldom filled again.
 */
export const DEFAULT_BOOKING_WINDOW: BookingWindow = {
  patientDaysAhead: 92,
  lateCancellationHours: 24,
};

/** How many local days ahead class dates are made: 36 sessions at two a week, from a month ahead, fit. */
export const CLASS_DATES_AHEAD_DAYS = 160;

/** Who asks: staff may put a walk-in into a class that has begun. */
export type Booker = 'patient' | 'staff';

/** A class date as far as its window matters. */
export interface DatedClass extends Interval {
  readonly localDate: string;
}

/**
 * Whether a class takes bookings at an instant: from patients until it starts and so many days ahead, from staff until it ends.
 * @param zone the site's IANA zone, which says what day it is there
 */
export function takesBookings(
  date: DatedClass,
  booker: Booker,
  now: Date,
  zone: string,
  window: BookingWindow,
): boolean {
  if (booker === 'staff') return now < date.endsAt;
  return now < date.startsAt && date.localDate <= lastPatientDate(now, zone, window);
}

/** The last local date that a patient may book today. */
export function lastPatientDate(now: Date, zone: string, window: BookingWindow): string {
  return addDays(localDateAt(now, zone), window.patientDaysAhead);
}

/** Whether the booker may still cancel: a patient until the class starts, staff whenever. */
export function takesCancellation(date: Interval, booker: Booker, now: Date): boolean {
  return booker === 'staff' || now < date.startsAt;
}

/** Whether a cancellation at this instant counts as late: hours that pass, whatever the clocks do meanwhile. */
export function isLateCancellation(date: Interval, now: Date, window: BookingWindow): boolean {
  return date.startsAt.getTime() - now.getTime() < window.lateCancellationHours * 3_600_000;
}

/** Whether it is still the class's day, or before it, at the site: until then a visit's marks may be taken back. */
export function isUndoable(localDate: string, now: Date, zone: string): boolean {
  return daysBetween(localDateAt(now, zone), localDate) >= 0;
}
