import { v7 as uuidv7 } from 'uuid';
import { bookingConflict, type BookingConflict } from '@shared/scheduling/booking-conflict';
import type { Transaction } from '../database/client';
import { constraintOf } from '../database/transaction';
import { fail, type Failure } from '../http/failure';
import {
  diagnose,
  insertAppointments,
  readBooked,
  type BookedRow,
  type DiagnosisRow,
} from './booking-repository';
import { announceBooked, isOpen, type ScheduleContext } from './schedule-context';

/** How often a booking that was refused for a reason that has gone is tried again. */
const ATTEMPTS = 5;

/** The constraints that refuse a place; any other error is none of ours to explain. */
const REFUSALS = new Set([
  'appointments_no_overlap',
  'appointments_once',
  'class_dates_open',
  'class_dates_places',
  'class_dates_monitors',
  'enrollments_active',
  'enrollments_course_limit',
  'patient_days_limit',
]);

export const isRefusal = (error: unknown): boolean => REFUSALS.has(constraintOf(error) ?? '');

interface Wish {
  readonly classDateId: string;
  readonly patientId: string;
}

/**
 * Books a place through the database's own limits: the insert takes it, and a constraint refuses the one too many.
 * @returns the appointment, or the first reason against it; `unavailable` when rivals came and went five times
 */
export async function bookAppointment(
  tx: Transaction,
  context: ScheduleContext,
  wish: Wish,
): Promise<BookedRow | Failure> {
  for (let attempt = 0; attempt < ATTEMPTS; attempt += 1) {
    const booked = await tryToBook(tx, context, wish);
    if (booked !== null) {
      await announceBooked(tx, context, [booked]);
      return booked;
    }
    const conflict = await conflictNow(tx, context, wish);
    if (conflict !== null) return fail(conflict);
  }
  return fail('unavailable', { retryAfterSeconds: 1 });
}

/** The appointment, or null when it was refused or its class was moved meanwhile; then nothing is left of it. */
async function tryToBook(
  tx: Transaction,
  context: ScheduleContext,
  { classDateId, patientId }: Wish,
): Promise<BookedRow | null> {
  const id = uuidv7();
  await tx.connection.query('SAVEPOINT booking');
  const booked = await insertOne(tx, context, id, { classDateId, patientId });
  const holds =
    booked !== null &&
    booked.startsAt.getTime() === booked.classStartsAt.getTime() &&
    isOpen(context, booked, booked.timeZone);
  if (holds) return booked;
  await tx.connection.query('ROLLBACK TO SAVEPOINT booking');
  return null;
}

async function insertOne(
  tx: Transaction,
  { actor, now }: ScheduleContext,
  id: string,
  { classDateId, patientId }: Wish,
): Promise<BookedRow | null> {
  const rows = {
    ids: [id],
    classDateIds: [classDateId],
    patientId,
    createdBy: actor.id,
    at: now,
  };
  try {
    if ((await insertAppointments(tx, rows)) === 0) return null;
  } catch (error) {
    if (isRefusal(error)) return null;
    throw error;
  }
  // Read after the class date's row is held: what it says now stays so until the end of the transaction.
  const [booked] = await readBooked(tx, [id]);
  return booked ?? null;
}

async function conflictNow(
  tx: Transaction,
  context: ScheduleContext,
  { classDateId, patientId }: Wish,
): Promise<BookingConflict | 'not-found' | null> {
  const found = await diagnose(tx, classDateId, patientId);
  return found === undefined ? 'not-found' : conflictIn(context, found);
}

function conflictIn(context: ScheduleContext, found: DiagnosisRow): BookingConflict | null {
  return bookingConflict({
    ...found,
    classOpen: found.scheduled && isOpen(context, found, found.timeZone),
  });
}
