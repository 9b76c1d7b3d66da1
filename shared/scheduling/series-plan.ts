import { bookingConflict, type BookingConflict } from './booking-conflict';
import { overlaps, type Interval } from './intervals';
import { addDays, daysBetween, toInstant, weekdayOf } from './wall-time';

/** What the person on the phone asks for. */
export interface SeriesAsk {
  /** ISO weekdays, 1 (Monday) to 7 (Sunday), at least one. */
  readonly weekdays: readonly number[];
  /** Wall time at the site, HH:MM. */
  readonly startTime: string;
  /** First local date that may be taken. */
  readonly from: string;
  /** How many dates. */
  readonly count: number;
}

/** A class date that the site offers. */
export interface OfferedClass extends Interval {
  readonly classDateId: string;
  readonly localDate: string;
  /** Wall time of its start, HH:MM. */
  readonly localStart: string;
  /** Scheduled, and takes bookings now. */
  readonly open: boolean;
  readonly placesLeft: number;
  readonly monitorsLeft: number;
}

/** A place that the patient holds already. */
export interface HeldPlace extends Interval {
  readonly localDate: string;
}

/** What bounds the patient's bookings. */
export interface PatientLoad {
  readonly courseActive: boolean;
  readonly courseLeft: number;
  readonly dailyLimit: number;
  readonly needsMonitor: boolean;
  readonly held: readonly HeldPlace[];
}

export interface Alternative {
  readonly classDateId: string;
  readonly startsAt: Date;
}

/** One date of a planned series: either a place, or why not and what else there is. */
export interface PlannedDate {
  readonly classDateId: string | null;
  readonly localDate: string;
  readonly startsAt: Date;
  readonly conflict: BookingConflict | null;
  readonly alternatives: readonly Alternative[];
}

const ALTERNATIVES = 3;
/** How far from the wished date another is still of use. */
const NEAR_DAYS = 3;

/**
 * The local dates that a series asks for, in order.
 * @throws RangeError when no weekday is named
 */
export function seriesDates({ weekdays, from, count }: SeriesAsk): string[] {
  if (!weekdays.some((day) => day >= 1 && day <= 7)) throw new RangeError('no weekday');
  const dates: string[] = [];
  for (let date = from; dates.length < count; date = addDays(date, 1)) {
    if (weekdays.includes(weekdayOf(date))) dates.push(date);
  }
  return dates;
}

/** The last local date whose classes matter to a series: where the last date's alternatives lie. */
export function seriesHorizon(ask: SeriesAsk): string {
  return addDays(seriesDates(ask).at(-1) ?? ask.from, NEAR_DAYS);
}

/** The first reason against adding a class to what the patient holds. */
export function conflictOf(
  offered: OfferedClass | undefined,
  load: PatientLoad,
  held: readonly HeldPlace[],
): BookingConflict | null {
  const taken = held.length - load.held.length;
  const sameDay = held.filter(({ localDate }) => localDate === offered?.localDate).length;
  return bookingConflict({
    classOpen: offered?.open ?? false,
    courseActive: load.courseActive,
    courseLeft: load.courseLeft - taken,
    dayLeft: load.dailyLimit - sameDay,
    overlapping: offered !== undefined && held.some((place) => overlaps(offered, place)),
    placesLeft: offered?.placesLeft ?? 0,
    needsMonitor: load.needsMonitor,
    monitorsLeft: offered?.monitorsLeft ?? 0,
  });
}

function minutesOf(localTime: string): number {
  const [hours = 0, minutes = 0] = localTime.split(':').map(Number);
  return hours * 60 + minutes;
}

/** Of classes that start together, the one to take: a free one before one that refuses, then the emptier. */
function chosenAt(
  date: string,
  ask: SeriesAsk,
  offers: readonly OfferedClass[],
  load: PatientLoad,
  held: readonly HeldPlace[],
): OfferedClass | undefined {
  const refuses = (offered: OfferedClass) => Number(conflictOf(offered, load, held) !== null);
  return offers
    .filter((offered) => offered.localDate === date && offered.localStart === ask.startTime)
    .sort((a, b) => refuses(a) - refuses(b) || b.placesLeft - a.placesLeft)[0];
}

/** Bookable classes near a wished date: the same day first, then the nearest days, then the nearest hours. */
function alternativesNear(
  date: string,
  ask: SeriesAsk,
  offers: readonly OfferedClass[],
  load: PatientLoad,
  held: readonly HeldPlace[],
): Alternative[] {
  const days = (offered: OfferedClass) => Math.abs(daysBetween(date, offered.localDate));
  const wished = minutesOf(ask.startTime);
  const minutes = (offered: OfferedClass) => Math.abs(minutesOf(offered.localStart) - wished);
  return offers
    .filter((offered) => offered.localDate >= ask.from && days(offered) <= NEAR_DAYS)
    .filter((offered) => conflictOf(offered, load, held) === null)
    .sort((a, b) => days(a) - days(b) || minutes(a) - minutes(b) || +a.startsAt - +b.startsAt)
    .slice(0, ALTERNATIVES)
    .map(({ classDateId, startsAt }) => ({ classDateId, startsAt }));
}

/**
 * Plans a series: for each wished date a place, or the first reason against it and what else is free nearby. Places taken
 * by earlier dates of the series count against the later ones.
 * @param offers the site's classes from the first wished date to `seriesHorizon`
 * @param zone the site's IANA zone
 */
export function planSeries(
  ask: SeriesAsk,
  offers: readonly OfferedClass[],
  load: PatientLoad,
  zone: string,
): PlannedDate[] {
  const held: HeldPlace[] = [...load.held];
  const planned = seriesDates(ask).map((localDate) => {
    const offered = chosenAt(localDate, ask, offers, load, held);
    const conflict = conflictOf(offered, load, held);
    if (offered !== undefined && conflict === null) held.push(offered);
    const startsAt = offered?.startsAt ?? toInstant({ localDate, localTime: ask.startTime }, zone);
    return { classDateId: offered?.classDateId ?? null, localDate, startsAt, conflict };
  });
  return planned.map((date) => ({
    ...date,
    alternatives:
      date.conflict === null ? [] : alternativesNear(date.localDate, ask, offers, load, held),
  }));
}
