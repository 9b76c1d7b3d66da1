import type { Role } from '@shared/contracts/accounts-contract';

/** Who calls, as of this request: read together with the session. */
export interface Actor {
  readonly id: string;
  readonly email: string;
  readonly displayName: string;
  readonly roles: readonly Role[];
  /** The sites whose patients a member of staff may see. */
  readonly siteIds: readonly string[];
  /** The person's own record, when there is one. */
  readonly patientId: string | null;
  readonly medicalDirector: boolean;
  /** A student's entries wait for a co-signature. */
  readonly student: boolean;
}

export const isStaff = (actor: Actor): boolean => actor.roles.some((role) => role !== 'patient');
