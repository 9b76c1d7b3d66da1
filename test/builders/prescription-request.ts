import type { PrescriptionAnswer, PrescriptionRequest } from '@shared/clinical/prescribing';
import { defaultPolicy, evaluatePrescription } from '@shared/clinical/prescribing';
import type { PrescriptionPolicy } from '@shared/clinical/prescribing';
import { prescriptionRequestSchema } from '@shared/contracts/prescriptions-contract';
import type { PrescriptionRequestInput } from '@shared/contracts/prescriptions-contract';

/** A man of 64 on a beta blocker with a measured peak of 134 and ischemia at 118: the example worked by hand. */
export const workedExample: PrescriptionRequestInput = {
  patient: { ageYears: 64, sexAtBirth: 'male', heightCm: 178, weightKg: 84 },
  resting: { seated: 62, standing: null, spread: 6 },
  risk: 'moderate',
  programWeek: 4,
  rhythm: 'sinus',
  rateActingDrugs: ['beta-blocker'],
  conditions: {
    coronaryDisease: true,
    heartFailure: 'none',
    transplant: 'none',
    ventricularAssistDevice: false,
    chronotropicIncompetence: false,
    autonomicNeuropathy: false,
    pulmonaryHypertension: false,
    dissection: false,
    peripheralArteryDisease: false,
    outflowObstruction: false,
  },
  devices: { icd: { status: 'none', zones: [] }, upperTrackingRate: null },
  test: {
    mode: 'treadmill',
    daysAgo: 13,
    endedBy: 'fatigue',
    sameRateActingDrugs: true,
    sameRhythmAndDevice: true,
    eventSince: false,
    restingHeartRate: null,
    peakHeartRate: 134,
    peakVo2: 22.4,
    peakMets: null,
    vo2Source: 'measured',
  },
  thresholds: [{ kind: 'ischemia', heartRate: 118, clearMets: null }],
  observedWork: null,
  walkTest: null,
  intensity: { lower: 0.4, upper: 0.8 },
  percentOfPeak: null,
  choice: { method: null, maximum: null },
};

export type TestInput = NonNullable<PrescriptionRequestInput['test']>;

/** Changes a copy of an input in place. */
export type Change = (input: PrescriptionRequestInput) => unknown;

/** The worked example with changes, as JSON holds it. */
export function prescriptionInput(...changes: Change[]): PrescriptionRequestInput {
  const input = structuredClone(workedExample);
  for (const change of changes) change(input);
  return input;
}

/** The worked example with changes, parsed. */
export const prescriptionRequest = (...changes: Change[]): PrescriptionRequest =>
  prescriptionRequestSchema.parse(prescriptionInput(...changes));

/** The answer to the worked example with changes; throws when a choice does not apply. */
export function answerTo(
  changes: Change | readonly Change[] = [],
  policy: PrescriptionPolicy = defaultPolicy,
): PrescriptionAnswer {
  const list = typeof changes === 'function' ? [changes] : changes;
  const evaluation = evaluatePrescription(prescriptionRequest(...list), policy);
  if (!evaluation.ok) throw new Error(evaluation.error.message);
  return evaluation.answer;
}

/** Changes the test of the example. */
export const withTest =
  (changes: Partial<TestInput>): Change =>
  (input) =>
    Object.assign(input, { test: { ...workedExample.test, ...changes } });

export const withoutTest: Change = (input) => (input.test = null);
export const withoutThresholds: Change = (input) => (input.thresholds = []);
