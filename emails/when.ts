import { DateTime } from 'luxon';

/** One appointment's time: instants in ISO 8601 with offset. */
export interface TimeSpan {
  startsAt: string;
  endsAt: string;
}

function local(instant: string, timeZone: string): DateTime<true> {
  const time = DateTime.fromISO(instant, { setZone: true }).setZone(timeZone);
  if (!time.isValid) throw new RangeError(`No such time or zone: ${instant}, ${timeZone}`);
  return time.setLocale('en-US');
}

/**
 * `Wednesday, December 2, 2026`
 * @param timeZone IANA name
 * @throws RangeError when the instant or the zone cannot be read
 */
export function dateInWords(instant: string, timeZone: string): string {
  return local(instant, timeZone).toFormat('cccc, LLLL d, yyyy');
}

/** `December 2`; as {@link dateInWords}. */
export function shortDate(instant: string, timeZone: string): string {
  return local(instant, timeZone).toFormat('LLLL d');
}

/** `Wednesday, December 2, 2026 at 9:00 AM Eastern Standard Time`; as {@link dateInWords}. */
export function timeInWords(instant: string, timeZone: string): string {
  const time = local(instant, timeZone);
  return time.toFormat(`cccc, LLLL d, yyyy 'at' h:mm a ZZZZZ`);
}

/** `Wednesday, December 2, 2026, 9:00 AM to 10:00 AM Eastern Standard Time`; as {@link dateInWords}. */
export function spanInWords({ startsAt, endsAt }: TimeSpan, timeZone: string): string {
  const start = local(startsAt, timeZone);
  const end = local(endsAt, timeZone);
  const last = end.hasSame(start, 'day') ? 'h:mm a ZZZZZ' : 'cccc, LLLL d, h:mm a ZZZZZ';
  // Only where the clocks change between the two must the first tell its zone too.
  const first = start.offset === end.offset ? 'h:mm a' : 'h:mm a ZZZZZ';
  return `${start.toFormat(`cccc, LLLL d, yyyy, ${first}`)} to ${end.toFormat(last)}`;
}
