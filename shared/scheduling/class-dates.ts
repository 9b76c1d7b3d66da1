import type { Interval } from './intervals';
import { recurrenceDates, type DateRule, type DateWindow } from './recurrence';
import { toInstant } from './wall-time';

/** What decides when a class is held. */
export interface ClassTimes {
  /** Wall time of the start at the site, HH:MM or HH:MM:SS. */
  readonly localStart: string;
  /** Minutes that pass from start to end, whatever the clocks do meanwhile. */
  readonly durationMinutes: number;
}

/** One occurrence of a class. */
export interface Occurrence extends Interval {
  readonly localDate: string;
}

/**
 * When a class of one local date starts and ends.
 * @param zone the site's IANA zone
 * @throws RangeError when the date, the time or the zone is none
 */
export function occurrenceOn(localDate: string, times: ClassTimes, zone: string): Occurrence {
  const startsAt = toInstant({ localDate, localTime: times.localStart }, zone);
  const endsAt = new Date(startsAt.getTime() + times.durationMinutes * 60_000);
  return { localDate, startsAt, endsAt };
}

/**
 * A class's dates in a window of local dates, in order, those of `closed` left out.
 * @throws RangeError when the rule or the zone is none
 */
export function occurrences(
  template: DateRule & ClassTimes,
  window: DateWindow,
  zone: string,
  closed: ReadonlySet<string> = new Set(),
): Occurrence[] {
  return recurrenceDates(template, window)
    .filter((localDate) => !closed.has(localDate))
    .map((localDate) => occurrenceOn(localDate, template, zone));
}
