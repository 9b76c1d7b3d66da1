import {
  isLateCancellation,
  isUndoable,
  takesCancellation,
} from '@shared/scheduling/booking-window';
import type { AppointmentStatus } from '@shared/contracts/schedule-contract';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import { lockPatientBooking, readBooked, type BookedRow } from './booking-repository';
import { announceCancelled, bookerOf, type ScheduleContext } from './schedule-context';
import { transitionRefusal } from './schedule-policy';

export interface StatusChange {
  readonly status: AppointmentStatus;
  /** Shown to staff beside a cancelled place. */
  readonly reason?: string;
  /** False refuses a cancellation that counts as late by now. */
  readonly acceptsLate?: boolean;
  /** What the caller has seen; left out by a feature that acts in its own transaction. */
  readonly version?: number;
}

const UPDATE = {
  name: 'change-appointment-status',
  text: `
    UPDATE appointments SET
      status = $2::appointment_status,
      version = version + 1,
      arrived_at = CASE WHEN $2 = 'arrived' THEN $3 WHEN $2 = 'booked' THEN NULL ELSE arrived_at END,
      checked_in_at = CASE WHEN $2 = 'checked-in' THEN $3 WHEN $2 = 'booked' THEN NULL ELSE checked_in_at END,
      cancelled_at = CASE WHEN $2 IN ('cancelled', 'entered-in-error') THEN $3 ELSE cancelled_at END,
      cancelled_by = CASE WHEN $2 IN ('cancelled', 'entered-in-error') THEN $4::uuid ELSE cancelled_by END,
      cancelled_reason = CASE WHEN $2 IN ('cancelled', 'entered-in-error') THEN $5 ELSE cancelled_reason END,
      exercised = coalesce($6, exercised)
    WHERE id = $1`,
};

async function writeStatus(
  tx: Transaction,
  by: Pick<ScheduleContext, 'actor' | 'now'>,
  id: string,
  change: StatusChange & { readonly exercised?: boolean },
): Promise<void> {
  const { status, reason = null, exercised = null } = change;
  await tx.connection.query({
    ...UPDATE,
    values: [id, status, by.now, by.actor.id, reason, exercised],
  });
}

/** The appointment with its patient's places locked: nobody else changes it until the transaction ends. */
async function lockAppointment(tx: Transaction, id: string): Promise<BookedRow | null> {
  const [seen] = await readBooked(tx, [id]);
  if (seen === undefined) return null;
  await lockPatientBooking(tx, seen.patientId);
  const [locked] = await readBooked(tx, [id]);
  return locked ?? null;
}

function refusalOf(
  context: ScheduleContext,
  appointment: BookedRow,
  change: StatusChange,
): Failure | null {
  const { actor, now } = context;
  const refusal = transitionRefusal({
    from: appointment.status,
    to: change.status,
    roles: actor.roles,
    undoable: isUndoable(appointment.localDate, now, appointment.timeZone),
  });
  if (refusal === 'forbidden') return fail('forbidden');
  if (change.version !== undefined && change.version !== appointment.version) {
    return fail('stale-version');
  }
  if (refusal !== null) return fail(refusal);
  if (change.status === 'cancelled' && !takesCancellation(appointment, bookerOf(actor), now)) {
    return fail('illegal-transition', {
      title: 'This class has started, so it can’t be cancelled here. Please call us.',
    });
  }
  if (change.acceptsLate === false && isLateCancellation(appointment, now, context.window)) {
    return fail('late-cancellation');
  }
  return null;
}

/** Tells of a place given back; a change between statuses that hold it is nobody else's matter. */
async function announceFreed(
  tx: Transaction,
  context: ScheduleContext,
  appointment: BookedRow,
  status: AppointmentStatus,
): Promise<void> {
  const struckOut = status === 'entered-in-error';
  if (status !== 'cancelled' && !struckOut) return;
  if (appointment.status === 'cancelled') return;
  await announceCancelled(tx, context, appointment, {
    byProgram: struckOut,
    late: !struckOut && isLateCancellation(appointment, context.now, context.window),
  });
}

/**
 * Moves an appointment to another status, as the transition table allows it to this person.
 * @returns the appointment as it then is, or why not: `not-found`, `forbidden`, `stale-version`, `illegal-transition`
 */
export async function changeStatus(
  tx: Transaction,
  context: ScheduleContext,
  id: string,
  change: StatusChange,
): Promise<BookedRow | Failure> {
  const appointment = await lockAppointment(tx, id);
  if (appointment === null) return fail('not-found');
  const refusal = refusalOf(context, appointment, change);
  if (refusal !== null) return refusal;
  await writeStatus(tx, context, id, change);
  await announceFreed(tx, context, appointment, change.status);
  const [changed] = await readBooked(tx, [id]);
  return changed ?? fail('not-found');
}

/**
 * Takes a booked place back for the program, as when a site closes for a day.
 * @returns whether it was still booked
 */
export async function cancelForProgram(
  tx: Transaction,
  context: ScheduleContext,
  id: string,
  reason: string,
): Promise<boolean> {
  const appointment = await lockAppointment(tx, id);
  if (appointment?.status !== 'booked') return false;
  await writeStatus(tx, context, id, { status: 'cancelled', reason });
  await announceCancelled(tx, context, appointment, { byProgram: true, late: false });
  return true;
}

/**
 * Marks a visit as done, in the transaction that signs its session record; no other way leads there.
 * @param outcome.exercised false for a patient who came but was held at the door: a visit, but no session
 * @returns the appointment, or `not-found`, `not-checked-in`
 */
export async function fulfilAppointment(
  tx: Transaction,
  by: Pick<ScheduleContext, 'actor' | 'now'>,
  id: string,
  outcome: { readonly exercised: boolean },
): Promise<BookedRow | Failure> {
  const appointment = await lockAppointment(tx, id);
  if (appointment === null) return fail('not-found');
  if (appointment.status !== 'checked-in') return fail('not-checked-in');
  await writeStatus(tx, by, id, { status: 'fulfilled', exercised: outcome.exercised });
  const [changed] = await readBooked(tx, [id]);
  return changed ?? fail('not-found');
}
