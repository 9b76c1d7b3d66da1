import type { Role } from '@shared/contracts/accounts-contract';

/** Who works out, writes and reads ranges. */
export const prescribingRoles: readonly Role[] = ['exercise-physiologist', 'physician', 'nurse'];

/** Who signs a range; a nurse reads and proposes. */
export const signingRoles: readonly Role[] = ['exercise-physiologist', 'physician'];

interface Signer {
  readonly roles: readonly Role[];
  readonly student: boolean;
}

/** Whose signature is a physician's; a student's waits for a co-signature whatever their role. */
export const signsAsPhysician = ({ roles, student }: Signer): boolean =>
  roles.includes('physician') && !student;

interface Signed {
  readonly status: 'draft' | 'active' | 'completed' | 'revoked' | 'entered-in-error';
  readonly signedBy: string | null;
}

/**
 * Whether someone has nothing left to sign.
 * - in force, or superseded: everyone
 * - signed by staff: everyone but a physician, and a physician who is that signer
 */
export function hasNothingToSign(row: Signed, signer: Signer & { readonly id: string }): boolean {
  if (row.status === 'active' || row.status === 'completed') return true;
  if (row.signedBy === null) return false;
  return row.signedBy === signer.id || !signsAsPhysician(signer);
}

/** Who may read the policy at all. */
export const policyReaders: readonly Role[] = [
  'administrator',
  'physician',
  'exercise-physiologist',
];

/** Who publishes the policy: an administrator, or the physician who is marked medical director. */
export const mayChangePolicy = (person: Signer & { readonly medicalDirector: boolean }): boolean =>
  person.roles.includes('administrator') || (person.medicalDirector && signsAsPhysician(person));
