import type { Bpm, Range } from '../../units';
import { bpm, roundDown, roundUp } from '../../units';
import type { Ceiling } from './answer';
import type { PrescriptionPolicy } from './policy';
import type { HeartRateRange } from './request';

/** Whole rates, lower end up and upper end down, so that rounding never widens; a narrow range may come out inverted. */
export function roundInward({ lower, upper }: Range<Bpm>): HeartRateRange {
  return { lower: bpm(roundUp(lower)), upper: bpm(roundDown(upper)) };
}

/** The range with its upper end at most at the ceiling; the lower end never moves. */
export function cutAtCeiling(range: HeartRateRange, ceiling: Ceiling | null): HeartRateRange {
  if (ceiling === null || range.upper <= ceiling.value) return range;
  return { lower: range.lower, upper: ceiling.value };
}

/** The range, or null when it is narrower than the policy lets a range be. */
export function ifWideEnough(
  range: HeartRateRange,
  policy: PrescriptionPolicy,
): HeartRateRange | null {
  return range.upper - range.lower >= policy.range.minimumWidth ? range : null;
}
