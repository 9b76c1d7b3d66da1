import type { Bpm, Range } from '../units';
import type { VitalPhase } from './vital-sign-bounds';

export const placements = ['below', 'in', 'above', 'over-ceiling'] as const;
/** Where a heart rate lies relative to a prescription. */
export type Placement = (typeof placements)[number];

export interface Marks {
  readonly target: Range<Bpm> | null;
  /** The rate never to pass. */
  readonly ceiling: { readonly value: Bpm } | null;
}

/**
 * Places a rate, bpm: over the ceiling when above its value, else relative to the target, both ends of which
 * are in. Null when there is no target and the ceiling, if any, is not passed: effort leads.
 */
export function placeHeartRate(rate: Bpm, { target, ceiling }: Marks): Placement | null {
  if (ceiling !== null && rate > ceiling.value) return 'over-ceiling';
  if (target === null) return null;
  if (rate < target.lower) return 'below';
  return rate > target.upper ? 'above' : 'in';
}

/**
 * Places a reading's rate. A target is for work, so at rest and in recovery the ceiling alone counts.
 * @returns null where there is no rate, or nothing to read it against
 */
export function placeReading(
  phase: VitalPhase,
  heartRate: Bpm | null,
  { target, ceiling }: Marks,
): Placement | null {
  if (heartRate === null) return null;
  return placeHeartRate(heartRate, { target: phase === 'exercise' ? target : null, ceiling });
}
