import { bpm, roundDown, roundUp } from '../../units';
import type { Ceiling, PrescriptionAnswer } from './answer';
import type { HeartRateRange } from './request';

/** How far below a binding ceiling the patient's own range ends, bpm. */
const patientMargin = 3;

/** Ten seconds are a sixth of a minute. */
const countsAMinute = 6;

const binds = (target: HeartRateRange, ceiling: Ceiling | null): boolean =>
  ceiling !== null && target.upper === ceiling.value;

/** The range that the patient is told. */
export function patientTargetOf(
  target: HeartRateRange | null,
  ceiling: Ceiling | null,
): HeartRateRange | null {
  if (target === null || !binds(target, ceiling)) return target;
  return { lower: target.lower, upper: bpm(target.upper - patientMargin) };
}

/** Beats to count in ten seconds, rounded inward, one less at the top when a ceiling binds; null when empty. */
export function tenSecondCountOf(
  target: HeartRateRange | null,
  ceiling: Ceiling | null,
): PrescriptionAnswer['tenSecondCount'] {
  if (target === null) return null;
  const lower = roundUp(target.lower / countsAMinute);
  const upper = roundDown(target.upper / countsAMinute) - (binds(target, ceiling) ? 1 : 0);
  return lower <= upper ? { lower, upper } : null;
}
