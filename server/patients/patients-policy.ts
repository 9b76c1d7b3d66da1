import type { Role } from '@shared/contracts/accounts-contract';

/** What a patient's page is made of, by who needs it. */
export type FieldGroup = 'identity' | 'contact' | 'course' | 'chart';

/** Those who treat: they read and write the chart, and open and end courses, which rest on a diagnosis. */
export const chartRoles: readonly Role[] = ['nurse', 'exercise-physiologist', 'physician'];

const desk: readonly Role[] = ['front-desk', 'director', 'administrator'];

/**
 * Who reads which fields, once a record is open to them at all (staff: of their sites; a patient: their own).
 *
 * | group    | fields                                                      | read by              |
 * | -------- | ----------------------------------------------------------- | -------------------- |
 * | identity | name, record number, birth date, sex, site                  | everyone             |
 * | contact  | e-mail, phone, time zone, account                           | everyone             |
 * | course   | status, dates, payer, sessions booked and attended          | everyone             |
 * | chart    | diagnoses, risk, range in force, record, vital signs, flags | those who treat      |
 */
const readers: Readonly<Record<FieldGroup, readonly Role[]>> = {
  identity: [...chartRoles, ...desk, 'patient'],
  contact: [...chartRoles, ...desk, 'patient'],
  course: [...chartRoles, ...desk, 'patient'],
  chart: chartRoles,
};

interface Holder {
  readonly roles: readonly Role[];
}

const holdsOne = (actor: Holder, roles: readonly Role[]): boolean =>
  actor.roles.some((role) => roles.includes(role));

export const mayRead = (actor: Holder, group: FieldGroup): boolean =>
  holdsOne(actor, readers[group]);

/** Who searches the list of patients. */
export const searchRoles: readonly Role[] = [...chartRoles, ...desk];

/** Who registers patients and keeps their names and contacts. */
export const registrarRoles: readonly Role[] = [...chartRoles, 'front-desk', 'administrator'];

/** What a patient changes of their own record; everything else is the program's. */
export const ownFields: readonly string[] = ['timeZone'];

export const isRegistrar = (actor: Holder): boolean => holdsOne(actor, registrarRoles);

/** Who ends a threshold without a new finding. */
export const retiringRoles: readonly Role[] = ['physician'];

interface Entered {
  readonly recordedBy: string;
  readonly recordedAt: Date;
}

const ownCorrectionHours = 24;

/**
 * A threshold entered in error no longer limits, so only a physician takes it back, or who entered it, within a day;
 * every other entry may be taken back by those who treat.
 */
export function mayEnterInError(
  actor: Holder & { readonly id: string },
  kind: string,
  entry: Entered,
  now: Date,
): boolean {
  if (kind !== 'thresholds' || holdsOne(actor, retiringRoles)) return true;
  const hours = (now.getTime() - entry.recordedAt.getTime()) / 3_600_000;
  return entry.recordedBy === actor.id && hours <= ownCorrectionHours;
}
