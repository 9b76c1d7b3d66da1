import { sql } from 'drizzle-orm';
import type {
  AttendedSession,
  CourseProgress,
  MyProgress,
} from '@shared/contracts/my-progress-contract';
import type { Queryable } from '../database/client';
import { fail } from '../http/failure';

interface CourseRow
  extends
    Record<string, unknown>,
    Pick<CourseProgress, 'status' | 'planned' | 'done' | 'booked' | 'closedOn'> {
  readonly id: string;
  readonly eventOn: string;
}

/** The course that runs, else the latest. */
async function courseOf(
  db: Queryable,
  patientId: string,
  now: Date,
): Promise<CourseRow | undefined> {
  const { rows } = await db.execute<CourseRow>(sql`
    SELECT e.id, e.status, e.planned_sessions AS planned, e.attended AS done, e.closed_on::text AS "closedOn",
           e.qualifying_event_on::text AS "eventOn",
           (SELECT count(*)::int FROM appointments a
              JOIN class_dates d ON d.id = a.class_date_id JOIN class_templates t ON t.id = d.template_id
             WHERE a.enrollment_id = e.id AND a.status IN ('booked', 'arrived', 'checked-in')
               AND a.ends_at > ${now.toISOString()}::timestamptz AND t.kind = 'exercise') AS booked
      FROM enrollments e WHERE e.patient_id = ${patientId}
     ORDER BY e.status IN ('active', 'on-hold') DESC, e.enrolled_on DESC, e.id DESC LIMIT 1`);
  return rows[0];
}

/** The sessions that the course's counter counts, each by its own readings; of an amended reading the amendment alone. */
async function sessionsOf(db: Queryable, enrollmentId: string): Promise<AttendedSession[]> {
  const { rows } = await db.execute<AttendedSession & Record<string, unknown>>(sql`
    SELECT a.local_date::text AS "localDate", round(v.rate)::int AS "heartRate", round(v.effort)::int AS effort,
           CASE WHEN r.range_withdrawn = '{}' THEN nullif(p.result -> 'patientTarget', 'null') END AS target
      FROM appointments a
      JOIN class_dates d ON d.id = a.class_date_id
      JOIN class_templates t ON t.id = d.template_id
      LEFT JOIN session_records r ON r.appointment_id = a.id
      LEFT JOIN prescriptions p ON p.id = r.prescription_id
      LEFT JOIN LATERAL (
        SELECT avg(heart_rate) AS rate, avg(perceived_exertion) AS effort FROM vital_signs
         WHERE session_record_id = r.id AND phase = 'exercise' AND status NOT IN ('amended', 'entered-in-error')
      ) v ON true
     WHERE a.enrollment_id = ${enrollmentId} AND a.status = 'fulfilled' AND a.exercised AND t.kind = 'exercise'
     ORDER BY a.starts_at, a.id`);
  return rows;
}

/** @param since local date of the event that led to the course */
async function walksOf(
  db: Queryable,
  patientId: string,
  since: string,
): Promise<CourseProgress['walks']> {
  const { rows } = await db.execute<{ performedOn: string; distanceMeters: number }>(sql`
    SELECT performed_on::text AS "performedOn", distance_meters AS "distanceMeters" FROM walk_tests
     WHERE patient_id = ${patientId} AND performed_on >= ${since} AND entered_in_error_at IS NULL
     ORDER BY performed_on, id`);
  const [first] = rows;
  const latest = rows.at(-1);
  return first && latest ? { first, latest } : null;
}

async function progressOf(
  db: Queryable,
  patientId: string,
  { id, eventOn, ...course }: CourseRow,
): Promise<CourseProgress> {
  return {
    ...course,
    sessions: await sessionsOf(db, id),
    walks: await walksOf(db, patientId, eventOn),
  };
}

/** How far a patient's own course has come, and whom to ask. @throws Failure `not-found` */
export async function myProgress(db: Queryable, patientId: string, now: Date): Promise<MyProgress> {
  const { rows } = await db.execute<MyProgress['site'] & Record<string, unknown>>(sql`
    SELECT s.name, s.phone FROM patients p JOIN sites s ON s.id = p.site_id WHERE p.id = ${patientId}`);
  const [site] = rows;
  if (!site) throw fail('not-found');
  const course = await courseOf(db, patientId, now);
  return { site, course: course ? await progressOf(db, patientId, course) : null };
}
