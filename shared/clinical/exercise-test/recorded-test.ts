import type { Bpm, Centimeters, Kilograms, Minutes, MmHg, Vo2, Watts } from '../../units';
import type { Gait } from '../gait';
import type { SexAtBirth, TestMode } from '../prescribing/request';
import type { RecoveryPosture, TestEffort } from './heart-rate-recovery';
import type { TestProtocol } from './protocols';
import type { TreadmillSetting } from './ramps';

/** What the record of a test holds, as far as something is computed from it; null is not recorded. */
export interface RecordedTest {
  readonly protocol: TestProtocol;
  readonly mode: TestMode;
  readonly ageYears: number;
  readonly sexAtBirth: SexAtBirth;
  readonly height: Centimeters | null;
  readonly weight: Kilograms | null;
  /** Time of exercise. */
  readonly time: Minutes | null;
  /** The highest stage that was finished: of a treadmill, or of an ergometer. */
  readonly lastSetting: TreadmillSetting | null;
  readonly lastPower: Watts | null;
  readonly gait: Gait | null;
  readonly handrail: boolean | null;
  readonly restingHeartRate: Bpm | null;
  readonly peakHeartRate: Bpm | null;
  readonly peakSystolic: MmHg | null;
  readonly recovery: readonly { readonly minute: 1 | 2; readonly heartRate: Bpm }[];
  readonly posture: RecoveryPosture | null;
  /** Limited by symptoms, or stopped before. */
  readonly effort: TestEffort | null;
  readonly onBetaBlocker: boolean | null;
  /** By gas analysis. */
  readonly measuredVo2: Vo2 | null;
}

/** A number made from the record, beside what it means and where it comes from. */
export interface ComputedValue {
  readonly key: string;
  readonly label: string;
  /** Not rounded; null with the reason. */
  readonly value: number | null;
  readonly unit: 'METs' | 'mL/kg/min' | '%' | 'bpm' | 'bpm × mmHg' | '';
  /** What a cut-off says of it; null without one. */
  readonly judgment: string | null;
  readonly source: string;
  /** Why there is no value or no judgment, or what to keep in mind. */
  readonly why: string | null;
}

type Part = Pick<ComputedValue, 'key' | 'label' | 'unit' | 'source'>;

export const found = (
  part: Part,
  value: number,
  judgment: string | null = null,
  why: string | null = null,
): ComputedValue => ({ ...part, value, judgment, why });

export const notFound = (part: Part, why: string): ComputedValue => ({
  ...part,
  value: null,
  judgment: null,
  why,
});
