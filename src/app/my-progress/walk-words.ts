import type { CourseProgress } from '@shared/contracts/my-progress-contract';
import { feetOf, meters } from '@shared/units/distance';
import { formatLocalDate } from '../ui/words/dates';

type Walks = NonNullable<CourseProgress['walks']>;

const feet = (distanceMeters: number): number => Math.round(feetOf(meters(distanceMeters)));

const count = (number: number): string => number.toLocaleString('en-US');

const told = ({ distanceMeters }: Walks['first']): string =>
  `${count(feet(distanceMeters))} feet (${Math.round(distanceMeters)} m)`;

/** The six-minute walk in sentences: what was walked, and how the latest stands to the first. */
export function walkWords({ first, latest }: Walks): string[] {
  const before = `On ${formatLocalDate(first.performedOn)} you walked ${told(first)}.`;
  if (first.performedOn === latest.performedOn) return [before];
  const change = feet(latest.distanceMeters) - feet(first.distanceMeters);
  const now = `On ${formatLocalDate(latest.performedOn)} you walked ${told(latest)}.`;
  if (change > 0) return [before, now, `That is ${count(change)} feet farther.`];
  if (change === 0) return [before, now, 'That is just as far.'];
  const less = `That is ${count(-change)} feet less. Walks differ from day to day. Ask your team what it means for you.`;
  return [before, now, less];
}
