import { localDateAt, toInstant } from '@shared/scheduling/wall-time';

/** A calendar day as the count of days since 1970-01-01: the generator adds and compares thousands of them. */
export type Day = number;

const DAY_MS = 86_400_000;
const NOON_MINUTES = 12 * 60;

/** @param localDate YYYY-MM-DD */
export function dayOf(localDate: string): Day {
  return Date.parse(`${localDate}T00:00:00Z`) / DAY_MS;
}

/** YYYY-MM-DD */
export function isoOf(day: Day): string {
  return new Date(day * DAY_MS).toISOString().slice(0, 10);
}

/** ISO weekday: 1 is Monday, 7 is Sunday. 1970-01-01 was a Thursday. */
export function weekdayOf(day: Day): number {
  return ((day + 3) % 7) + 1;
}

/** The calendar day at a place at an instant. */
export function dayAt(instant: Date, zone: string): Day {
  return dayOf(localDateAt(instant, zone));
}

const noons = new Map<string, number>();

/**
 * The instant of a wall time by day: 04:00 to 24:00, when clocks are not set.
 * @param minutes after midnight on the wall
 */
export function instantAt(day: Day, minutes: number, zone: string): Date {
  const key = `${zone} ${day}`;
  let noon = noons.get(key);
  if (noon === undefined) {
    noon = toInstant({ localDate: isoOf(day), localTime: '12:00' }, zone).getTime();
    noons.set(key, noon);
  }
  return new Date(noon + (minutes - NOON_MINUTES) * 60_000);
}

export function minutesLater(instant: Date, minutes: number): Date {
  return new Date(instant.getTime() + minutes * 60_000);
}
