import type { PoolClient } from 'pg';
import { databaseErrorOf } from '../database/transaction';
import { appointments, enrollments } from '../database/schema';
import { insertRows, updateUntouched } from './bulk';
import type { Change } from './bulk';
import type { AppointmentRow, RowOf } from './rows';
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

const isAddable = (row: Enrollment): Enrollment => ({
  ...row,
  status: 'active',
  closedOn: null,
  closedReason: null,
});

/** The first courses of everybody, then the second: a person has one course of a phase at a time. */
function rounds({ added, changed }: TableChanges<Enrollment>): TableChanges<Enrollment>[] {
  const seen = new Map<string, number>();
  const result: TableChanges<Enrollment>[] = [];
  const all = [
    ...changed.map(({ before, after }) => ({ before, after })),
    ...added.map((after) => ({ before: null, after })),
  ];
  for (const { before, after } of all.sort((a, b) =>
    a.after.enrolledOn < b.after.enrolledOn ? -1 : 1,
  )) {
    const key = `${after.patientId} ${after.phase}`;
    const round = seen.get(key) ?? 0;
    seen.set(key, round + 1);
    const tables = (result[round] ??= { added: [], changed: [] });
    if (before) tables.changed.push({ before, after });
    else tables.added.push(after);
  }
  return result;
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
    ({ id, status, version }) => standing.get(id ?? '') !== `${status} ${version}`,
  );
  return new Set(touched.map(({ id }) => id ?? ''));
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
    return classDateId && !touched.has(row.enrollmentId) ? [{ ...row, classDateId }] : [];
  });
  const applied = new Set<string>();
  const handled = new Set<string>();
  for (const { added, changed } of rounds(changes.enrollments)) {
    const fresh = await insertRows(connection, enrollments, added.map(isAddable));
    for (const { id } of added) if (!fresh.has(id ?? '')) touched.add(id ?? '');
    const ours = changed.filter(({ before }) => !touched.has(before.id ?? ''));
    const opened = ours.map(({ before }) => ({ before, after: isAddable(before) }));
    await updateUntouched(connection, enrollments, opened);
    const courses = new Set([...fresh, ...ours.map(({ before }) => before.id ?? '')]);
    const rows = placed.filter(({ enrollmentId }) => courses.has(enrollmentId));
    for (const id of await insertPlaces(connection, rows)) applied.add(id);
    for (const id of courses) handled.add(id);
    await closeCourses(connection, [
      ...added
        .filter(({ id }) => fresh.has(id ?? ''))
        .map((after) => ({ before: isAddable(after), after })),
      ...ours.map(({ before, after }) => ({ before: isAddable(before), after })),
    ]);
  }
  const steady = placed.filter(
    ({ enrollmentId }) => !handled.has(enrollmentId) && !touched.has(enrollmentId),
  );
  for (const id of await insertPlaces(connection, steady)) applied.add(id);
  for (const id of await updatePlaces(connection, changes.appointments.changed)) applied.add(id);
  return { touched, appointments: applied };
}

const closeCourses = (connection: PoolClient, changes: readonly Change<Enrollment>[]) =>
  updateUntouched(connection, enrollments, changes);
