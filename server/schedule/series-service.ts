import { v7 as uuidv7 } from 'uuid';
import { bookingConflicts, type BookingConflict } from '@shared/scheduling/booking-conflict';
import {
  conflictOf,
  planSeries,
  seriesHorizon,
  type HeldPlace,
  type OfferedClass,
  type PatientLoad,
  type PlannedDate,
  type SeriesAsk,
} from '@shared/scheduling/series-plan';
import { toWallTime } from '@shared/scheduling/wall-time';
import { errorTitle, type FieldError } from '@shared/errors';
import type { Transaction } from '../database/client';
import { fail, type Failure } from '../http/failure';
import { isRefusal } from './booking-service';
import {
  insertAppointments,
  lockPatientBooking,
  readBooked,
  type BookedRow,
} from './booking-repository';
import { announceBooked, isOpen, type ScheduleContext } from './schedule-context';
import {
  lockClassDates,
  readActiveCourse,
  readHeldPlaces,
  readOffers,
  readTimeZone,
  type CourseRow,
  type OfferRow,
} from './series-queries';

const ATTEMPTS = 5;

const offerOf = (context: ScheduleContext, row: OfferRow): OfferedClass => ({
  ...row,
  localStart: toWallTime(row.startsAt, row.timeZone).localTime,
  open: row.scheduled && isOpen(context, row, row.timeZone),
});

const loadOf = (course: CourseRow | null, held: readonly HeldPlace[]): PatientLoad => ({
  courseActive: course !== null,
  courseLeft: course?.courseLeft ?? 0,
  dailyLimit: course?.dailyLimit ?? 0,
  needsMonitor: course?.monitored ?? false,
  held,
});

/**
 * Plans a series and books nothing: the answer may have changed when it is booked.
 * @returns a date for each asked, with the first reason against it and what else is free nearby; null when there is no such site
 */
export async function previewSeries(
  tx: Transaction,
  context: ScheduleContext,
  ask: SeriesAsk & { readonly patientId: string; readonly siteId: string },
): Promise<PlannedDate[] | null> {
  const timeZone = await readTimeZone(tx, ask.siteId);
  if (timeZone === null) return null;
  const span = { from: ask.from, to: seriesHorizon(ask) };
  const offers = await readOffers(tx, ask.siteId, span);
  const course = await readActiveCourse(tx, ask.patientId);
  const held = await readHeldPlaces(tx, ask.patientId, span);
  return planSeries(
    ask,
    offers.map((row) => offerOf(context, row)),
    loadOf(course, held),
    timeZone,
  );
}

interface SeriesWish {
  readonly patientId: string;
  readonly classDateIds: readonly string[];
}

/**
 * Books every date of a series or none. The patient's places are locked first, then the class dates in one order, so that what
 * is then read stays true until the insert.
 * @returns the appointments, earliest first; or the first reason in the order of the contract, with each date that failed
 */
export async function bookSeries(
  tx: Transaction,
  context: ScheduleContext,
  wish: SeriesWish,
): Promise<BookedRow[] | Failure> {
  for (let attempt = 0; attempt < ATTEMPTS; attempt += 1) {
    await tx.connection.query('SAVEPOINT series');
    const outcome = await tryToBookSeries(tx, context, wish);
    if (outcome !== null) return outcome;
    await tx.connection.query('ROLLBACK TO SAVEPOINT series');
  }
  return fail('unavailable', { retryAfterSeconds: 1 });
}

async function tryToBookSeries(
  tx: Transaction,
  context: ScheduleContext,
  { patientId, classDateIds }: SeriesWish,
): Promise<BookedRow[] | Failure | null> {
  await lockPatientBooking(tx, patientId);
  const rows = await lockClassDates(tx, classDateIds);
  const conflicts = await conflictsOf(tx, context, patientId, rows, classDateIds);
  if (conflicts.size > 0) return failureOf(conflicts, classDateIds);
  const ids = classDateIds.map(() => uuidv7());
  const { actor, now } = context;
  try {
    await insertAppointments(tx, { ids, classDateIds, patientId, createdBy: actor.id, at: now });
  } catch (error) {
    // Only what changed outside the locks, as a course closed meanwhile: it is diagnosed at the next attempt.
    if (isRefusal(error)) return null;
    throw error;
  }
  const booked = await readBooked(tx, ids);
  await announceBooked(tx, context, booked);
  return booked;
}

/** The first reason against each date that can't be booked, earlier dates of the series counting against later ones. */
async function conflictsOf(
  tx: Transaction,
  context: ScheduleContext,
  patientId: string,
  rows: readonly OfferRow[],
  asked: readonly string[],
): Promise<Map<string, BookingConflict>> {
  const dates = rows.map(({ localDate }) => localDate).sort();
  const span = { from: dates[0] ?? '1900-01-01', to: dates.at(-1) ?? '1900-01-01' };
  const course = await readActiveCourse(tx, patientId);
  const load = loadOf(course, await readHeldPlaces(tx, patientId, span));
  const conflicts = new Map<string, BookingConflict>(asked.map((id) => [id, 'class-closed']));
  const held: HeldPlace[] = [...load.held];
  for (const row of [...rows].sort((a, b) => +a.startsAt - +b.startsAt)) {
    const needsMonitor = load.needsMonitor && row.exercise;
    const conflict = conflictOf(offerOf(context, row), { ...load, needsMonitor }, held);
    if (conflict === null) {
      held.push(row);
      conflicts.delete(row.classDateId);
    } else {
      conflicts.set(row.classDateId, conflict);
    }
  }
  return conflicts;
}

function failureOf(
  conflicts: ReadonlyMap<string, BookingConflict>,
  asked: readonly string[],
): Failure {
  const found = [...conflicts.values()];
  const first = bookingConflicts.find((conflict) => found.includes(conflict)) ?? 'class-closed';
  const errors = asked.flatMap((id, index): FieldError[] => {
    const code = conflicts.get(id);
    return code === undefined
      ? []
      : [{ path: `classDateIds.${index}`, code, message: errorTitle[code] }];
  });
  return fail(first, { errors });
}
