import type { Mets, Range, Vo2 } from '../../units';
import { mets, metsOf, toMillionths, vo2, vo2Of } from '../../units';
import { fractionOfReserve } from '../heart-rate-reserve';
import { fractionOfVo2Reserve, vo2AtReserve } from '../oxygen-uptake-reserve';
import type { Decision } from './decision';
import type { Findings } from './findings';

/** The upper end as a fraction of reserve: the intensity's, or the leading method's own where it is not of reserve. */
function upperFraction(
  { intensity, request, usableTest }: Findings,
  { method, upperBound }: Decision,
): number {
  if (upperBound === null || usableTest === null || method === 'heart-rate-reserve') {
    return intensity.upper;
  }
  return fractionOfReserve(request.resting.seated, usableTest.peakHeartRate, upperBound);
}

/** The fraction of reserve left under the heart-rate ceiling, where a usable test tells it. */
export function underRateCeiling(fraction: number, { intensityAtCeiling }: Findings): number {
  return intensityAtCeiling === null ? fraction : Math.min(fraction, intensityAtCeiling);
}

/** The fraction of reserve left under the work ceiling, where an accepted peak tells it. */
export function underWorkCeiling(
  fraction: number,
  { peak }: Findings,
  workCeiling: Mets | null,
): number {
  if (peak === null || workCeiling === null) return fraction;
  const left = fractionOfVo2Reserve(peak.vo2, vo2Of(workCeiling));
  return left === null ? fraction : Math.min(fraction, left);
}

const isWithheld = (
  { request, blocks }: Findings,
  workCeiling: Mets | null,
  { reasons }: Decision,
) =>
  (request.thresholds.length > 0 && workCeiling === null) ||
  blocks.includes('physician-sets') ||
  reasons.includes('no-valid-range');

/** The work to do, as oxygen uptake; null without a peak to base it on, or when nothing is left under the ceilings. */
export function targetVo2Of(
  findings: Findings,
  decision: Decision,
  workCeiling: Mets | null,
): Range<Vo2> | null {
  const { peak, intensity } = findings;
  if (peak === null || isWithheld(findings, workCeiling, decision)) return null;
  const lower = vo2AtReserve(peak.vo2, intensity.lower);
  const reached = vo2AtReserve(
    peak.vo2,
    underRateCeiling(upperFraction(findings, decision), findings),
  );
  const upper = workCeiling === null ? reached : vo2(Math.min(reached, vo2Of(workCeiling)));
  if (toMillionths(upper - lower) < 0) return null;
  // Where both ends meet, the noise of binary fractions must not put the lower one above.
  return { lower: vo2(Math.min(lower, upper)), upper };
}

/** The same in METs; at most the work ceiling, to the last digit. */
export function targetMetsOf(
  target: Range<Vo2> | null,
  workCeiling: Mets | null,
): Range<Mets> | null {
  if (target === null) return null;
  const upper = metsOf(target.upper);
  const most = workCeiling === null ? upper : mets(Math.min(upper, workCeiling));
  return { lower: mets(Math.min(metsOf(target.lower), most)), upper: most };
}
