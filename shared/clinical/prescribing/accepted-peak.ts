import type { Bpm, Vo2 } from '../../units';
import { vo2Of } from '../../units';
import type { PrescriptionPolicy } from './policy';
import type { ExerciseTest } from './request';
import { whyPeakNotAccepted } from './usable-test';

/** A peak on which work may be based, also where heart rate cannot lead. */
export interface AcceptedPeak {
  /** Gross, mL/kg/min. */
  readonly vo2: Vo2;
  readonly test: ExerciseTest;
}

/** The peak of a test that ended by cardiac effort or sign, is not too old and has seen no event since; else null. */
export function acceptedPeak(
  test: ExerciseTest | null,
  policy: PrescriptionPolicy,
): AcceptedPeak | null {
  if (test === null || whyPeakNotAccepted(test, policy) !== null) return null;
  const peakVo2 = test.peakVo2 ?? (test.peakMets === null ? null : vo2Of(test.peakMets));
  return peakVo2 === null ? null : { vo2: peakVo2, test };
}

/** Resting rate that goes with a test: its own, else today's seated one. */
export const restingRateOf = (test: ExerciseTest, seated: Bpm): Bpm =>
  test.restingHeartRate ?? seated;
