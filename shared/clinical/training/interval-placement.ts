import type { Bpm, Minutes } from '../../units';
import type { Marks, Placement } from '../placement';
import { placeHeartRate } from '../placement';
import type { IntervalPolicy } from './interval-policy';

export type BoutKind = 'work' | 'recovery';

export interface BoutMoment {
  readonly kind: BoutKind;
  /** How long the bout is meant to last. */
  readonly minutes: Minutes;
  /** How far into the bout the rate was read; null when nobody noted it. */
  readonly minutesIn: Minutes | null;
}

/**
 * Places a rate within intervals. A rate over the ceiling is always told. A recovery bout never reads *below*; neither do a short
 * work bout, a longer one before the rate has had time to follow, and one read at an unknown moment.
 * @returns null where the rate says nothing about the work
 */
export function placeIntervalRate(
  rate: Bpm,
  { kind, minutes, minutesIn }: BoutMoment,
  { target, ceiling }: Marks,
  { shortBoutMinutes }: IntervalPolicy,
): Placement | null {
  const followsWork = kind === 'work' && minutes >= shortBoutMinutes;
  const placement = placeHeartRate(rate, { target: followsWork ? target : null, ceiling });
  const isSettled = minutesIn !== null && minutesIn >= shortBoutMinutes;
  return placement === 'below' && !isSettled ? null : placement;
}
