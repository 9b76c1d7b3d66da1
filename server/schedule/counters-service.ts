import type { Database } from '../database/client';

/** A kept number that is not what its rows say. */
export interface CounterDifference {
  readonly counter: string;
  readonly id: string;
  readonly kept: number;
  readonly counted: number;
}

const HOLDS = `status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow')`;

/** Every counter of attendance beside what its appointments say; the rows where the two differ. */
const DIFFERENCES = `
  WITH of_dates AS (
    SELECT class_date_id AS id, count(*) AS booked, count(*) FILTER (WHERE monitored) AS monitored
      FROM appointments WHERE ${HOLDS} GROUP BY class_date_id
  ), of_courses AS (
    SELECT enrollment_id AS id, count(*) AS booked FROM appointments WHERE ${HOLDS} GROUP BY enrollment_id
  ), of_days AS (
    SELECT patient_id, local_date, count(*) AS booked FROM appointments WHERE ${HOLDS} GROUP BY patient_id, local_date
  ), sessions AS (
    SELECT a.enrollment_id AS id, a.local_date, min(a.local_date) OVER (PARTITION BY a.enrollment_id) AS first_on
      FROM appointments a JOIN class_dates d ON d.id = a.class_date_id JOIN class_templates t ON t.id = d.template_id
     WHERE a.status = 'fulfilled' AND a.exercised AND t.kind = 'exercise'
  ), attended AS (
    SELECT id, count(*) AS attended, count(*) FILTER (WHERE local_date <= first_on + 252) AS in_window
      FROM sessions GROUP BY id
  ), told AS (
    SELECT 'class_dates.booked' AS counter, d.id::text, d.booked AS kept, coalesce(f.booked, 0) AS counted
      FROM class_dates d LEFT JOIN of_dates f ON f.id = d.id
    UNION ALL
    SELECT 'class_dates.monitored_booked', d.id::text, d.monitored_booked, coalesce(f.monitored, 0)
      FROM class_dates d LEFT JOIN of_dates f ON f.id = d.id
    UNION ALL
    SELECT 'enrollments.booked', e.id::text, e.booked, coalesce(f.booked, 0)
      FROM enrollments e LEFT JOIN of_courses f ON f.id = e.id
    UNION ALL
    SELECT 'enrollments.attended', e.id::text, e.attended, coalesce(f.attended, 0)
      FROM enrollments e LEFT JOIN attended f ON f.id = e.id
    UNION ALL
    SELECT 'enrollments.attended_in_window', e.id::text, e.attended_in_window, coalesce(f.in_window, 0)
      FROM enrollments e LEFT JOIN attended f ON f.id = e.id
    UNION ALL
    SELECT 'patient_days.booked', coalesce(p.patient_id, f.patient_id) || ' ' || coalesce(p.local_date, f.local_date),
           coalesce(p.booked, 0), coalesce(f.booked, 0)
      FROM patient_days p FULL JOIN of_days f ON f.patient_id = p.patient_id AND f.local_date = p.local_date
  )
  SELECT counter, id, kept::int, counted::int FROM told WHERE kept <> counted ORDER BY counter, id LIMIT 1000`;

/** The counters that are not what their appointments say, at most 1,000; [] is as it must be. */
export async function counterDifferences(database: Database): Promise<CounterDifference[]> {
  const { rows } = await database.$client.query<CounterDifference>(DIFFERENCES);
  return rows;
}
