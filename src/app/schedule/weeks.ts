import type { ClassDate } from '@shared/contracts/schedule-contract';
import { addDays, weekdayOf } from '@shared/scheduling/wall-time';

/** ISO weekdays with their names, Monday first. */
export const weekdays = [
  { day: 1, name: 'Monday', short: 'Mon' },
  { day: 2, name: 'Tuesday', short: 'Tue' },
  { day: 3, name: 'Wednesday', short: 'Wed' },
  { day: 4, name: 'Thursday', short: 'Thu' },
  { day: 5, name: 'Friday', short: 'Fri' },
  { day: 6, name: 'Saturday', short: 'Sat' },
  { day: 7, name: 'Sunday', short: 'Sun' },
] as const;

/** The Monday of the week of a date. */
export function mondayOf(localDate: string): string {
  return addDays(localDate, 1 - weekdayOf(localDate));
}

/** The days of the week that begins on a Monday. */
export function daysOfWeek(monday: string): string[] {
  return weekdays.map((_, index) => addDays(monday, index));
}

/** Class dates by local date, every day of the week there. */
export function byDay(
  monday: string,
  dates: readonly ClassDate[],
): { localDate: string; dates: readonly ClassDate[] }[] {
  return daysOfWeek(monday).map((localDate) => ({
    localDate,
    dates: dates.filter((date) => date.localDate === localDate),
  }));
}

/** An hour at which classes start on chosen weekdays, and on how many of their dates there is room. */
export interface StartTime {
  /** HH:MM at the site. */
  readonly localStart: string;
  readonly free: number;
  readonly dates: number;
}

/** The hours at which exercise classes start on the chosen weekdays, earliest first. */
export function startTimes(
  dates: readonly ClassDate[],
  chosen: readonly number[],
  hasRoom: (date: ClassDate) => boolean,
): StartTime[] {
  const counted = new Map<string, { free: number; dates: number }>();
  for (const date of dates) {
    if (date.kind !== 'exercise' || !chosen.includes(weekdayOf(date.localDate))) continue;
    const count = counted.get(date.localStart) ?? { free: 0, dates: 0 };
    count.dates += 1;
    count.free += Number(hasRoom(date));
    counted.set(date.localStart, count);
  }
  return [...counted]
    .map(([localStart, count]) => ({ localStart, ...count }))
    .sort((a, b) => a.localStart.localeCompare(b.localStart));
}
