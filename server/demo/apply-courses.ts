import type { PoolClient } from 'pg';
import { databaseErrorOf } from '../database/transaction';
import { appointments, enrollments } from '../database/schema';
import { insertRows, updateUntouched } from './bulk';
import type { Change } from './bulk';
import type { RowOf } from './row-of';
import type { AppointmentRow } from './rows';
import type { StoryChanges, TableChanges } from './story-changes';

type Enrollment = RowOf<'enrollments'>;
type Placed = AppointmentRow & { readonly classDateId: string };

/** Which rows of the story are in the database as told; the rest is someone's own by now. */
export interface AppliedCourses {
  /** Courses that a person has changed. */
  readonly touched: ReadonlySet<string>;
  /** Appointments that were added or changed. */
  readonly appointments: ReadonlySet<string>;
}

const checkViolation = '23514';

/** A course as it takes bookings. */
const opened = (row: Enrollment): Enrollment => ({
  ...row,
  status: 'active',
  closedOn: null,
  closedReason: null,
});

/** The first courses of everybody, then the second: a person has one course of a phase at a time. */
function rounds({ added, changed }: TableChanges<Enrollment>): TableChanges<Enrollment>[] {
  const courses = [...changed, ...added.map((after) => ({ before: null, after }))];
  courses.sort((a, b) => (a.after.enrolledOn < b.after.enrolledOn ? -1 : 1));
  const seen = new Map<string, number>();
  const result: TableChanges<Enrollment>[] = [];
  for (const { before, after } of courses) {
    const key = `${after.patientId} ${after.phase}`;
    const number = seen.get(key) ?? 0;
    seen.set(key, number + 1);
    const round = (result[number] ??= { added: [], changed: [] });
    if (before) round.changed.push({ before, after });
    else round.added.push(after);
  }
  return result;
}

/**
 * Adds the courses of a round and opens those that stand as told; one that cannot be added counts as touched.
 * @returns how each open course is to stand once it is filled
 */
async function openRound(
  connection: PoolClient,
  { added, changed }: TableChanges<Enrollment>,
  touched: Set<string>,
): Promise<Change<Enrollment>[]> {
  const fresh = await insertRows(connection, enrollments, added.map(opened));
  for (const { id } of added) if (!fresh.has(id)) touched.add(id);
  const standing = changed.filter(({ after }) => !touched.has(after.id));
  const openings = standing.map(({ before }) => ({ before, after: opened(before) }));
  await updateUntouched(connection, enrollments, openings);
  return [
    ...added.filter(({ id }) => fresh.has(id)).map((after) => ({ before: opened(after), after })),
    ...standing.map(({ before, after }) => ({ before: opened(before), after })),
  ];
}

/** Adds what the book has room for; where a counter refuses, the rest goes in without that one. */
async function insertPlaces(connection: PoolClient, rows: readonly Placed[]): Promise<string[]> {
  if (rows.length === 0) return [];
  await connection.query('SAVEPOINT places');
  try {
    const added = await insertRows(connection, appointments, rows);
    await connection.query('RELEASE SAVEPOINT places');
    return [...added];
  } catch (error) {
    await connection.query('ROLLBACK TO SAVEPOINT places');
    if (databaseErrorOf(error)?.code !== checkViolation) throw error;
    if (rows.length === 1) return [];
    const half = Math.ceil(rows.length / 2);
    return [
      ...(await insertPlaces(connection, rows.slice(0, half))),
      ...(await insertPlaces(connection, rows.slice(half))),
    ];
  }
}

/** The courses of the story that no longer stand as it told them. */
async function touchedCourses(
  connection: PoolClient,
  told: readonly Enrollment[],
): Promise<Set<string>> {
  const { rows } = await connection.query<{ id: string; status: string; version: number }>(
    'SELECT id, status, version FROM enrollments WHERE id = ANY($1) FOR NO KEY UPDATE',
    [told.map(({ id }) => id)],
  );
  const standing = new Map(rows.map((row) => [row.id, `${row.status} ${row.version}`]));
  const touched = told.filter(
    ({ id, status, version }) => standing.get(id) !== `${status} ${version}`,
  );
  return new Set(touched.map(({ id }) => id));
}

/** Changes of bookings that nobody has touched, of class dates that nobody has touched. */
function updatePlaces(connection: PoolClient, changes: readonly Change<AppointmentRow>[]) {
  return updateUntouched(
    connection,
    appointments,
    changes,
    `NOT EXISTS (SELECT FROM session_records r WHERE r.appointment_id = t.id)
     AND EXISTS (SELECT FROM class_dates d
                  WHERE d.id = t.class_date_id AND d.version = 1 AND d.status <> 'closed')`,
  );
}

/**
 * Writes courses and their appointments round by round: a course is opened, filled, and closed again where the story
 * has closed it, since a closed course takes no bookings.
 * @param told the courses as the story told them last
 * @param classDateIds by template and local date
 */
export async function applyCourses(
  connection: PoolClient,
  changes: StoryChanges,
  told: readonly Enrollment[],
  classDateIds: ReadonlyMap<string, string>,
): Promise<AppliedCourses> {
  const touched = await touchedCourses(connection, told);
  const placed = changes.appointments.added.flatMap((row) => {
    const classDateId = classDateIds.get(`${row.templateId} ${row.localDate}`);
    return classDateId ? [{ ...row, classDateId }] : [];
  });
  const { added, changed } = changes.enrollments;
  const moving = new Set([...added, ...changed.map(({ after }) => after)].map(({ id }) => id));
  const applied: string[] = [];
  const fill = async (isMeant: (course: string) => boolean) => {
    const rows = placed.filter(
      ({ enrollmentId: course }) => isMeant(course) && !touched.has(course),
    );
    applied.push(...(await insertPlaces(connection, rows)));
  };
  for (const round of rounds(changes.enrollments)) {
    const open = await openRound(connection, round, touched);
    const courses = new Set(open.map(({ after }) => after.id));
    await fill((course) => courses.has(course));
    await updateUntouched(connection, enrollments, open);
  }
  await fill((course) => !moving.has(course));
  applied.push(...(await updatePlaces(connection, changes.appointments.changed)));
  return { touched, appointments: new Set(applied) };
}
