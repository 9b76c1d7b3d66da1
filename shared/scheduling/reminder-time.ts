import { addDays, localDateAt, toInstant } from './wall-time';

/** Common practice, from memory: the evening before, when people plan the next day and offices still answer the next morning. */
const REMINDER_TIME = '18:00';

/**
 * When a class is reminded of: at 18:00 of the day before, as clocks show it where the patient lives.
 * @param zone the patient's IANA zone, else the site's
 * @throws RangeError when the zone is none
 */
export function reminderDueAt(startsAt: Date, zone: string): Date {
  const localDate = addDays(localDateAt(startsAt, zone), -1);
  return toInstant({ localDate, localTime: REMINDER_TIME }, zone);
}
