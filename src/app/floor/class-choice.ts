import type { ClassDate } from '@shared/contracts/schedule-contract';

/** Staff set up a quarter of an hour before a class begins. */
const openBefore = 15 * 60_000;

export type ClassMoment = 'now' | 'next' | 'earlier';

type Dated = Pick<ClassDate, 'startsAt' | 'endsAt'>;

/** Whether a class is on or about to begin, is still to come, or is over. */
export function momentOf({ startsAt, endsAt }: Dated, now: Date): ClassMoment {
  const at = now.getTime();
  if (at >= Date.parse(endsAt)) return 'earlier';
  return at >= Date.parse(startsAt) - openBefore ? 'now' : 'next';
}

const order: readonly ClassMoment[] = ['now', 'next', 'earlier'];

/** Today's classes: those on now, then the next ones, then those that are over, the latest of them first. */
export function inOrderOfUse<C extends Dated>(classDates: readonly C[], now: Date): C[] {
  const rank = (one: C): number => order.indexOf(momentOf(one, now));
  const start = (one: C): number =>
    momentOf(one, now) === 'earlier' ? -Date.parse(one.startsAt) : Date.parse(one.startsAt);
  return [...classDates].sort((a, b) => rank(a) - rank(b) || start(a) - start(b));
}

/** How far from now a class is that is not on, in ms. */
function away({ startsAt, endsAt }: Dated, now: Date): number {
  return Math.max(Date.parse(startsAt) - now.getTime(), now.getTime() - Date.parse(endsAt));
}

/** The class to open with: on now with the most people in it, else the nearest in which anybody is. */
export function classToOpen<C extends Dated & Pick<ClassDate, 'booked'>>(
  classDates: readonly C[],
  now: Date,
): C | undefined {
  const ordered = inOrderOfUse(classDates, now);
  const held = ordered.filter(({ booked }) => booked > 0);
  const running = held.filter((one) => momentOf(one, now) === 'now');
  const fullest = [...running].sort((a, b) => b.booked - a.booked)[0];
  const nearest = [...held].sort((a, b) => away(a, now) - away(b, now))[0];
  return fullest ?? nearest ?? ordered[0];
}
