import type { Bpm, Range } from '../../units';
import { bpm } from '../../units';
import type { Findings } from './findings';
import type { PrescriptionPolicy } from './policy';
import type { HeartRateRange, PrescriptionRequest } from './request';
import { cutAtCeiling, ifWideEnough, roundInward } from './range';

/** From this seated rate on, a range above rest starts too high. */
const fastSeatedRate = 100;

/** Why resting-plus is not for this patient, given that heart rate can lead; null when it is. */
export function whyNotRestingPlus({
  rhythm,
  resting,
  conditions: { heartFailure, autonomicNeuropathy },
}: PrescriptionRequest): string | null {
  if (rhythm !== 'sinus') return 'Only in sinus rhythm.';
  if (resting.seated >= fastSeatedRate) {
    return `Only with a seated rate below ${fastSeatedRate}.`;
  }
  if (heartFailure === 'reduced') return 'Not with a reduced ejection fraction.';
  if (heartFailure === 'unknown') return 'Heart failure is not known, which counts as reduced.';
  return autonomicNeuropathy ? 'Not with autonomic neuropathy.' : null;
}

/** Standing, else seated, rate plus 20 to 30 (policy); the upper end is capped, the lower never moves. Not rounded. */
export function restingPlusRange(
  { resting }: PrescriptionRequest,
  { restingPlus }: PrescriptionPolicy,
): Range<Bpm> {
  const rest = resting.standing ?? resting.seated;
  return {
    lower: bpm(rest + restingPlus.lower),
    upper: bpm(Math.min(rest + restingPlus.upper, restingPlus.cap)),
  };
}

/** The starting guide for a patient led by effort whose heart rate could lead: resting-plus under the ceiling. */
export function guideOf(findings: Findings): HeartRateRange | null {
  const { request, policy, ceiling, blocks } = findings;
  if (blocks.length > 0 || whyNotRestingPlus(request) !== null) return null;
  const range = roundInward(restingPlusRange(request, policy));
  return ifWideEnough(cutAtCeiling(range, ceiling), policy);
}
