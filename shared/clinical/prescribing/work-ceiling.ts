import type { Bpm, Mets } from '../../units';
import { mets, metsOf } from '../../units';
import { fractionOfReserve } from '../heart-rate-reserve';
import { vo2AtReserve } from '../oxygen-uptake-reserve';
import { restingRateOf } from './accepted-peak';
import type { AcceptedPeak } from './accepted-peak';
import type { Findings } from './findings';
import { marginKeyOf } from './policy';
import type { PrescriptionPolicy } from './policy';
import type { Threshold } from './request';

/** Work at a threshold less its margin, by the line from rest to peak of the test; the line is not clamped. */
function derivedWork(
  { kind, heartRate }: Threshold,
  policy: PrescriptionPolicy,
  peak: AcceptedPeak,
  seated: Bpm,
): Mets {
  const rate = heartRate - policy.margin[marginKeyOf[kind]];
  const rest = restingRateOf(peak.test, seated);
  return metsOf(vo2AtReserve(peak.vo2, fractionOfReserve(rest, peak.test.peakHeartRate, rate)));
}

/**
 * The work never to pass: the lowest over the thresholds of the highest work tolerated clear of each, else
 * derived from the test. Null without a threshold, and null when any threshold has no work.
 */
export function workCeilingOf({ request, policy, peak }: Findings): Mets | null {
  const { thresholds, resting } = request;
  let lowest = Infinity;
  for (const threshold of thresholds) {
    const work =
      threshold.clearMets ??
      (peak === null ? null : derivedWork(threshold, policy, peak, resting.seated));
    if (work === null) return null;
    lowest = Math.min(lowest, work);
  }
  return thresholds.length === 0 ? null : mets(lowest);
}
