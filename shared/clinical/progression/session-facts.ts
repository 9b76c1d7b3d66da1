import type { Bpm, Minutes, MmHg } from '../../units';
import type { VitalPhase } from '../vital-sign-bounds';
import type { MachineSetting } from './machine-setting';

/** A reading of the floor, as far as the next step depends on it; null is not measured. */
export interface SessionReading {
  readonly phase: VitalPhase;
  readonly heartRate: Bpm | null;
  readonly systolic: MmHg | null;
  readonly diastolic: MmHg | null;
  /** Percent. */
  readonly oxygenSaturation: number | null;
  /** Borg 6–20. */
  readonly perceivedExertion: number | null;
  /** `none` is asked, and there were none. */
  readonly symptoms: readonly string[];
}

/** A signed session on one machine. */
export interface SessionFacts {
  readonly daysAgo: number;
  /** The work at the end of conditioning; null when not recorded. */
  readonly setting: MachineSetting | null;
  /** Conditioning without pauses. */
  readonly minutes: Minutes | null;
  /** Bouts too short for heart rate to follow: it is then read against the ceiling alone. */
  readonly shortBouts: boolean;
  /** Today's dose of a rate-acting drug was missed: effort led. */
  readonly doseMissed: boolean;
  /** Whether it was done under the prescription that is in force now. */
  readonly underThisPrescription: boolean;
  readonly readings: readonly SessionReading[];
}
