import type { Role } from '@shared/contracts/accounts-contract';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';

/**
 * Who books for patients of their sites: those who speak with them. The administrator looks after accounts and rules and
 * has no reason to open a record, save to strike out an appointment that was entered in error; the physician and the
 * director read the schedule.
 */
export const bookingRoles = ['front-desk', 'nurse', 'exercise-physiologist'] as const;

/** Who sees which patients are in a class. */
export const rosterRoles = [...bookingRoles, 'physician'] as const;

/** Who plans the classes of a site. */
export const planningRoles = ['front-desk', 'administrator'] as const;

interface Person {
  readonly roles: readonly Role[];
  readonly siteIds: readonly string[];
  readonly patientId: string | null;
}

const holdsOne = (person: Pick<Person, 'roles'>, roles: readonly Role[]): boolean =>
  roles.some((role) => person.roles.includes(role));

/** Whether a person may book this patient, whose record they may open: a patient themselves, or who speaks with patients. */
export const mayBookFor = (person: Person, patientId: string): boolean =>
  person.patientId === patientId || holdsOne(person, bookingRoles);

/** Whether a person may plan the classes of a site: the front desk its own, an administrator any. */
export const mayPlan = (person: Person, siteId: string): boolean =>
  person.roles.includes('administrator') ||
  (holdsOne(person, planningRoles) && person.siteIds.includes(siteId));

interface Transition {
  readonly from: readonly AppointmentStatus[];
  readonly roles: readonly Role[];
  /** Only until the class's day ends at its site. */
  readonly undo?: true;
}

const CLINICAL: readonly Role[] = ['nurse', 'exercise-physiologist'];

/** A place is fulfilled by signing the session record alone, so no request may ask for it. */
const transitions: Partial<Record<AppointmentStatus, Transition>> = {
  arrived: { from: ['booked'], roles: bookingRoles },
  'checked-in': { from: ['arrived'], roles: CLINICAL },
  cancelled: { from: ['booked'], roles: [...bookingRoles, 'patient'] },
  noshow: { from: ['booked'], roles: bookingRoles },
  booked: { from: ['arrived', 'checked-in', 'noshow'], roles: bookingRoles, undo: true },
};

export type TransitionRefusal = 'forbidden' | 'illegal-transition';

/** What a change of status is judged by. */
export interface TransitionFacts {
  readonly from: AppointmentStatus;
  readonly to: AppointmentStatus;
  readonly roles: readonly Role[];
  /** Whether it is still the class's day, or before it, at its site. */
  readonly undoable: boolean;
}

/** Why a person may not make this change, or null when they may. */
export function transitionRefusal(facts: TransitionFacts): TransitionRefusal | null {
  const { from, to, roles, undoable } = facts;
  if (to === 'entered-in-error') {
    if (!roles.includes('administrator')) return 'forbidden';
    return from === 'entered-in-error' ? 'illegal-transition' : null;
  }
  const transition = transitions[to];
  if (transition === undefined) {
    return roles.some((role) => role !== 'patient') ? 'illegal-transition' : 'forbidden';
  }
  if (!transition.roles.some((role) => roles.includes(role))) return 'forbidden';
  if (!transition.from.includes(from)) return 'illegal-transition';
  return transition.undo && !undoable ? 'illegal-transition' : null;
}
