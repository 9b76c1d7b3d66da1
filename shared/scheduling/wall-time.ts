import { DateTime, IANAZone } from 'luxon';

const DAY_MS = 86_400_000;
const MINUTE_MS = 60_000;

/** A date and time as the clock on a site's wall shows it. */
export interface WallTime {
  /** ISO calendar date, YYYY-MM-DD. */
  readonly localDate: string;
  /** HH:MM or HH:MM:SS, 00:00 to 23:59:59. */
  readonly localTime: string;
}

/** Whether the name is an IANA time zone that this runtime knows. */
export function isTimeZone(name: string): boolean {
  return IANAZone.isValidZone(name);
}

/**
 * The instant at which a site's clock shows a wall time. A time that the clocks skip moves forward by the gap's length; of
 * one that they show twice, the first (RFC 5545 section 3.3.5; ECMAScript Temporal calls it "compatible").
 *
 * Offsets are asked of the zone a day to either side, so that the answer never depends on today's offset.
 * @param zone an IANA zone, such as America/New_York
 * @throws RangeError when the date, the time or the zone is none
 */
export function toInstant({ localDate, localTime }: WallTime, zone: string): Date {
  const iana = IANAZone.create(zone);
  const asUtc = DateTime.fromISO(`${localDate}T${localTime}`, { zone: 'utc' });
  if (!iana.isValid || !asUtc.isValid) {
    throw new RangeError(`no such wall time: ${localDate} ${localTime} ${zone}`);
  }
  const local = asUtc.toMillis();
  const before = iana.offset(local - DAY_MS);
  const after = iana.offset(local + DAY_MS);
  const found = [before, after]
    .map((offset) => ({ offset, instant: local - offset * MINUTE_MS }))
    .filter(({ offset, instant }) => iana.offset(instant) === offset)
    .map(({ instant }) => instant);
  return new Date(found.length > 0 ? Math.min(...found) : local - before * MINUTE_MS);
}

/**
 * What a site's clock shows at an instant, to the minute.
 * @param zone an IANA zone
 * @throws RangeError when the instant or the zone is none
 */
export function toWallTime(instant: Date, zone: string): WallTime {
  const offset = IANAZone.create(zone).offset(instant.getTime());
  if (Number.isNaN(offset)) throw new RangeError(`no such instant or zone: ${+instant} ${zone}`);
  const shown = new Date(instant.getTime() + offset * MINUTE_MS).toISOString();
  return { localDate: shown.slice(0, 10), localTime: shown.slice(11, 16) };
}

/** The calendar date at a site at an instant. */
export function localDateAt(instant: Date, zone: string): string {
  return toWallTime(instant, zone).localDate;
}

/** The calendar date `days` later (or earlier); no clock and no zone takes part. */
export function addDays(localDate: string, days: number): string {
  return DateTime.fromISO(localDate, { zone: 'utc' }).plus({ days }).toFormat('yyyy-MM-dd');
}

/** Calendar days from one date to another: negative when `to` is earlier. */
export function daysBetween(from: string, to: string): number {
  const start = DateTime.fromISO(from, { zone: 'utc' });
  return DateTime.fromISO(to, { zone: 'utc' }).diff(start, 'days').days;
}

/** ISO weekday: 1 is Monday, 7 is Sunday. */
export function weekdayOf(localDate: string): number {
  return DateTime.fromISO(localDate, { zone: 'utc' }).weekday;
}
