import { metsOf } from '../../units';
import type { AcceptedPeak } from './accepted-peak';
import type { PrescriptionPolicy } from './policy';
import type { FractionRange, PrescriptionRequest } from './request';

/** Below this peak, METs, the range of reserve starts lower. */
const lowCapacityMets = 3;

/** Program weeks 1 and 2 train in the narrow range. */
const firstFullWeek = 3;

/** Fractions of heart-rate reserve: the request's, else the policy's first that applies. */
export function intensityOf(
  { intensity, risk, programWeek }: PrescriptionRequest,
  policy: PrescriptionPolicy,
  peak: AcceptedPeak | null,
): FractionRange {
  if (intensity !== null) return intensity;
  if (peak !== null && metsOf(peak.vo2) < lowCapacityMets) return policy.intensity.lowCapacity;
  const careful = risk === 'high' || risk === 'unknown' || programWeek < firstFullWeek;
  return careful ? policy.intensity.narrow : policy.intensity.wide;
}
