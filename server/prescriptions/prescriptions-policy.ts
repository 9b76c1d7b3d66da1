import type {
  PrescriptionAnswer,
  PrescriptionPolicy,
  PrescriptionRequest,
} from '@shared/clinical/prescribing';
import type { Role } from '@shared/contracts/accounts-contract';

/** Who works out, writes and reads ranges. */
export const prescribingRoles: readonly Role[] = ['exercise-physiologist', 'physician', 'nurse'];

/** Who signs a range; a nurse reads and proposes. */
export const signingRoles: readonly Role[] = ['exercise-physiologist', 'physician'];

interface Signer {
  readonly roles: readonly Role[];
  readonly student: boolean;
}

export const isPhysician = ({ roles }: Signer): boolean => roles.includes('physician');

/** Why a range waits for a physician although staff signed it. */
export type PhysicianCause =
  'first-range' | 'student' | 'risk' | 'stop-caution' | 'estimated-maximum' | 'above-policy';

interface Proposal {
  readonly inputs: PrescriptionRequest;
  readonly result: PrescriptionAnswer;
  /** Whether a range was in force before in this course. */
  readonly first: boolean;
  readonly student: boolean;
}

/**
 * What a plan does not let staff sign alone, every cause that applies: the first range of a course; what a student
 * signed; high or unknown risk; a caution that says stop; an estimated maximum; an intensity above the policy's wide one.
 */
export function physicianCauses(
  { inputs, result, first, student }: Proposal,
  policy: PrescriptionPolicy,
): PhysicianCause[] {
  const causes: [PhysicianCause, boolean][] = [
    ['first-range', first],
    ['student', student],
    ['risk', inputs.risk === 'high' || inputs.risk === 'unknown'],
    ['stop-caution', result.cautions.some(({ severity }) => severity === 'stop')],
    ['estimated-maximum', result.maximum !== null && result.maximum.method !== 'measured'],
    ['above-policy', result.intensity.upper > policy.intensity.wide.upper],
  ];
  return causes.filter(([, applies]) => applies).map(([cause]) => cause);
}
