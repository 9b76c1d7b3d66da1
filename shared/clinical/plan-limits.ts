import type { PrescriptionAnswer, PrescriptionPolicy, PrescriptionRequest } from './prescribing';

/** Why a range needs a physician's signature although staff signed it, in the order in which it is told. */
export const physicianCauses = [
  'first-range',
  'student',
  'risk',
  'stop-caution',
  'estimated-maximum',
  'above-policy',
] as const;
export type PhysicianCause = (typeof physicianCauses)[number];

/** Each cause in words, to follow "A physician signs too: ". */
export const physicianCauseWords: Readonly<Record<PhysicianCause, string>> = {
  'first-range': 'it is the first range of this course',
  student: 'a student signed it',
  risk: 'the risk is high or not known',
  'stop-caution': 'a caution says stop',
  'estimated-maximum': 'the maximum is an estimate',
  'above-policy': 'the intensity is above the policy’s usual range',
};

export interface Proposal {
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
  /** Whether no range was in force before in this course. */
  readonly first: boolean;
  /** Whether a student is the signer. */
  readonly student: boolean;
}

const isAbove = ({ inputs, result }: Proposal, policy: PrescriptionPolicy): boolean =>
  result.intensity.upper > policy.intensity.wide.upper ||
  (result.method === 'percent-of-peak' &&
    inputs.percentOfPeak !== null &&
    inputs.percentOfPeak.upper > policy.percentOfPeak.upper);

/** What a plan does not let staff sign alone; [] when one signature of staff is enough. */
export function physicianCausesOf(
  proposal: Proposal,
  policy: PrescriptionPolicy,
): PhysicianCause[] {
  const { inputs, result, first, student } = proposal;
  const applies: Readonly<Record<PhysicianCause, boolean>> = {
    'first-range': first,
    student,
    risk: inputs.risk === 'high' || inputs.risk === 'unknown',
    'stop-caution': result.cautions.some(({ severity }) => severity === 'stop'),
    'estimated-maximum': result.maximum !== null && result.maximum.method !== 'measured',
    'above-policy': isAbove(proposal, policy),
  };
  return physicianCauses.filter((cause) => applies[cause]);
}
