import type { Appointment } from '@shared/contracts/schedule-contract';
import { toWallTime, weekdayOf } from '@shared/scheduling/wall-time';
import { clockOf, dateInWords } from '../../ui/site-time/site-time';
import { weekdays } from '../weeks';

/** What is read out to the caller: the rhythm, its first and last date, and each date that is otherwise. */
export interface SayBack {
  /** Mondays, Wednesdays and Fridays at 9:00 AM */
  readonly rhythm: string;
  readonly count: number;
  readonly first: string;
  readonly last: string;
  /** Thursday, December 10, 2:00 PM */
  readonly otherwise: readonly string[];
}

interface Visit {
  readonly localDate: string;
  readonly localTime: string;
}

function listOf(words: readonly string[]): string {
  return new Intl.ListFormat('en-US', { type: 'conjunction' }).format(words);
}

const inWords = ({ localDate, localTime }: Visit): string =>
  `${dateInWords(localDate, 'long')}, ${clockOf(localTime)}`;

/**
 * @param booked at least one, earliest first
 * @param asked the weekdays and the hour that the series was asked for
 */
export function sayBack(
  booked: readonly Pick<Appointment, 'startsAt'>[],
  asked: { readonly weekdays: readonly number[]; readonly startTime: string },
  timeZone: string,
): SayBack {
  const visits = booked.map(({ startsAt }) => toWallTime(new Date(startsAt), timeZone));
  const regular = ({ localDate, localTime }: Visit) =>
    localTime === asked.startTime && asked.weekdays.includes(weekdayOf(localDate));
  const days = weekdays.filter(({ day }) => asked.weekdays.includes(day));
  const [first, last] = [visits[0], visits.at(-1)];
  return {
    rhythm: `${listOf(days.map(({ name }) => `${name}s`))} at ${clockOf(asked.startTime)}`,
    count: visits.length,
    first: first ? inWords(first) : '',
    last: last ? inWords(last) : '',
    otherwise: visits.filter((visit) => !regular(visit)).map(inWords),
  };
}
