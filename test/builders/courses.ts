import type { Database } from '../../server/database/client';
import { buildPatient, buildUser } from './people';
import { buildClass, buildEnrollment } from './schedule';

const STARTS = { morning: '09:00', afternoon: '14:00', orientation: '17:00' } as const;

/** A visit as it ended: signed and exercised in the morning unless told otherwise. */
export interface CourseVisit {
  /** Local date, YYYY-MM-DD. */
  readonly on: string;
  readonly at?: keyof typeof STARTS;
  readonly status?: 'fulfilled' | 'checked-in' | 'noshow';
  readonly exercised?: boolean;
}

export interface CourseOptions {
  readonly visits: readonly CourseVisit[];
  readonly patient?: Partial<Parameters<typeof buildPatient>[1]>;
  readonly enrollment?: Partial<Parameters<typeof buildEnrollment>[1]>;
}

/** The local date so many days after another. */
export function daysAfter(date: string, days: number): string {
  return new Date(Date.parse(date) + days * 86_400_000).toISOString().slice(0, 10);
}

/** A visit every so many days, the first on `from`. */
export const visitsFrom = (from: string, count: number, everyDays = 2): CourseVisit[] =>
  Array.from({ length: count }, (_, index) => ({ on: daysAfter(from, index * everyDays) }));

/** A site's classes on every day of two years; makes whole courses there from what was attended. */
export async function buildCourses(
  database: Database,
  site: { readonly id: string; readonly timeZone: string },
): Promise<(options: CourseOptions) => Promise<string>> {
  const staff = await buildUser(database);
  const classes = await Promise.all(
    Object.entries(STARTS).map(async ([at, localStart]) => {
      const kind = at === 'orientation' ? at : 'exercise';
      const made = await buildClass(database, site, { kind, localStart, capacity: 60 });
      return [at, made.id] as const;
    }),
  );
  await database.$client.query(
    `INSERT INTO class_dates (id, template_id, site_id, local_date, starts_at, ends_at, capacity, monitored_capacity)
     SELECT gen_random_uuid(), t.id, t.site_id, day::date, (day::date + t.local_start) AT TIME ZONE $2,
            (day::date + t.local_start + interval '1 hour') AT TIME ZONE $2, 60, 12
       FROM class_templates t, generate_series('2025-01-01'::timestamp, '2026-12-31', interval '1 day') day
      WHERE t.id = ANY($1::uuid[])`,
    [classes.map(([, id]) => id), site.timeZone],
  );
  const idOf = Object.fromEntries(classes);

  return async ({ visits, patient, enrollment = {} }) => {
    const { status = 'active', ...columns } = enrollment;
    const { id: patientId } = await buildPatient(database, { siteId: site.id, ...patient });
    const course = await buildEnrollment(database, {
      sessionLimit: 72,
      monitored: false,
      ...columns,
      patientId,
      siteId: site.id,
    });
    const facts = visits.map(
      ({ on, at = 'morning', status: ended = 'fulfilled', exercised = true }) => ({
        template: idOf[at],
        on,
        ended,
        exercised,
      }),
    );
    await database.$client.query(
      `INSERT INTO appointments (id, class_date_id, patient_id, enrollment_id, status, exercised, monitored,
                                 local_date, starts_at, ends_at, created_by)
       SELECT gen_random_uuid(), d.id, $1, $2, v.ended::appointment_status, v.exercised, false,
              d.local_date, d.starts_at, d.ends_at, $3
         FROM jsonb_to_recordset($4) AS v(template uuid, "on" date, ended text, exercised boolean)
         JOIN class_dates d ON d.template_id = v.template AND d.local_date = v."on"`,
      [patientId, course.id, staff.id, JSON.stringify(facts)],
    );
    await database.$client.query('UPDATE enrollments SET status = $2 WHERE id = $1', [
      course.id,
      status,
    ]);
    return course.id;
  };
}
