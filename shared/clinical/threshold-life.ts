import type { Bpm } from '../units';
import type { TestEnding, ThresholdKind } from './prescribing/request';

/** A threshold in force, as far as a later test may end it. */
export interface StandingThreshold {
  readonly kind: ThresholdKind;
  readonly heartRate: Bpm;
  readonly daysAgo: number;
}

/** A later test; null is not recorded. */
export interface LaterTest {
  readonly daysAgo: number;
  readonly peakHeartRate: Bpm;
  readonly endedBy: TestEnding;
  /** What was found in it, at whatever rate. */
  readonly found: readonly ThresholdKind[] | null;
  /** Whether the ECG can show ischemia at all: not with bundle-branch block, pacing, digoxin and the like. */
  readonly ecgShowsIschemia: boolean | null;
  /** Same rate-acting drugs and doses as when the threshold was found. */
  readonly sameRateActingDrugs: boolean | null;
  readonly eventSince: boolean | null;
}

/** Angina is ischemia that is felt: neither is cleared by a test that showed the other. */
const alike: Readonly<Record<ThresholdKind, readonly ThresholdKind[]>> = {
  ischemia: ['ischemia', 'angina'],
  angina: ['angina', 'ischemia'],
  arrhythmia: ['arrhythmia'],
  'blood-pressure': ['blood-pressure'],
  symptom: ['symptom'],
};

const needsEcg: ReadonlySet<ThresholdKind> = new Set<ThresholdKind>(['ischemia', 'angina']);

const cardiacSigns: ReadonlySet<TestEnding> = new Set<TestEnding>([
  'angina',
  'st-change',
  'arrhythmia',
  'blood-pressure',
]);

/**
 * Why a later test does not clear a threshold; [] when it may be proposed as superseded. It is never ended by itself: a person
 * confirms, and what is not recorded clears nothing. A physician may retire a threshold for other reasons, by name.
 */
export function whyNotSuperseded(threshold: StandingThreshold, test: LaterTest): string[] {
  const { kind, heartRate } = threshold;
  const objections: readonly (readonly [boolean, string])[] = [
    [test.daysAgo >= threshold.daysAgo, 'The test is not later than the threshold.'],
    [test.peakHeartRate < heartRate, 'The test did not reach the rate of the threshold.'],
    [test.sameRateActingDrugs !== true, 'The rate-acting drugs differ, or it is not recorded.'],
    [test.eventSince !== false, 'An event has happened since the test, or it is not recorded.'],
    [test.found === null, 'What the test found is not recorded.'],
    [
      cardiacSigns.has(test.endedBy) || alike[kind].some((each) => test.found?.includes(each)),
      'The test was not clean.',
    ],
    [
      needsEcg.has(kind) && test.ecgShowsIschemia !== true,
      'The ECG cannot show ischemia, or it is not recorded whether it can.',
    ],
  ];
  return objections.flatMap(([stands, why]) => (stands ? [why] : []));
}
