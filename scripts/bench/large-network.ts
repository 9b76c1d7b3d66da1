import pg from 'pg';

/**
 * Ten years of a network of twelve sites, 34 appointments a course: every second patient belongs to the first two sites,
 * which the demonstration has. BENCH_COURSES: how many courses, 0 for the demonstration alone.
 */
export const COURSES = Number(process.env['BENCH_COURSES'] ?? 40_000);

/** What counts and checks row by row is left out while all is made as a whole; ids are UUIDs that follow from names. */
const BEGIN = `
  SET session_replication_role = replica;
  ALTER TABLE appointments DROP CONSTRAINT appointments_no_overlap;
  CREATE FUNCTION pg_temp.id_of(name text) RETURNS uuid LANGUAGE sql IMMUTABLE AS
    $$ SELECT overlay(overlay(md5(name) placing '4' from 13) placing '8' from 17)::uuid $$`;

/** The constraint that bookings rest on; then nothing is left for the database to do beside the calls that are measured. */
const END = [
  `ALTER TABLE appointments ADD CONSTRAINT appointments_no_overlap EXCLUDE USING gist (patient_id WITH =, during WITH &&)
     WHERE (status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow'))`,
  'VACUUM ANALYZE',
  'CHECKPOINT',
];

const STATEMENTS = [
  `INSERT INTO sites (id, name, time_zone, address, phone)
     SELECT gen_random_uuid(), 'Network site ' || n, 'America/New_York', n || ' Quay Street', '555-0100'
       FROM generate_series(1, 10) n`,
  `CREATE TEMP TABLE network_sites AS
     SELECT id, row_number() OVER (ORDER BY created_at, id) - 1 AS nth FROM sites`,
  `CREATE TEMP TABLE network AS
     SELECT n, pg_temp.id_of('patient' || n) AS patient_id, pg_temp.id_of('course' || n) AS course_id,
            CASE WHEN n % 2 = 0 THEN n / 2 % 2 ELSE 2 + n / 2 % 10 END AS nth,
            current_date - 3650 + n * 3640 / ${COURSES} AS first_on, n * 7919 % 37 AS attended
       FROM generate_series(1, ${COURSES}) n`,
  `INSERT INTO patients (id, record_number, family_name, given_name, birth_date, sex_at_birth, site_id)
     SELECT c.patient_id, 'N-' || c.n, 'Family' || md5(c.n::text), 'Given' || c.n % 500,
            '1930-01-01'::date + c.n * 31 % 20000, (ARRAY['female', 'male'])[1 + c.n % 2]::sex_at_birth, s.id
       FROM network c JOIN network_sites s USING (nth)`,
  `INSERT INTO enrollments (id, patient_id, site_id, status, qualifying_diagnosis, qualifying_event_on, payer, enrolled_on,
       closed_on, first_session_on, last_session_on, attended, attended_in_window)
     SELECT c.course_id, c.patient_id, s.id,
            CASE WHEN c.first_on > current_date - 250 THEN 'active' WHEN c.attended = 36 THEN 'completed' ELSE 'discontinued'
              END::enrollment_status,
            (ARRAY['heart-attack', 'stent', 'bypass', 'valve', 'heart-failure'])[1 + c.n % 5]::diagnosis_kind,
            c.first_on - 40, (ARRAY['medicare', 'commercial', 'medicaid', 'self-pay'])[1 + c.n % 4], c.first_on - 10,
            CASE WHEN c.first_on <= current_date - 250 THEN c.first_on + 120 END,
            c.first_on, c.first_on + 3 * c.attended, c.attended, c.attended
       FROM network c JOIN network_sites s USING (nth)`,
  `INSERT INTO class_templates (id, site_id, name, recurrence, starts_on, local_start, duration_minutes, capacity, monitored_places)
     SELECT pg_temp.id_of('class' || s.nth || '-' || hour), s.id, 'Network class ' || hour, 'FREQ=DAILY', current_date - 3650,
            make_time(hour::int, 0, 0), 60, 60, 60
       FROM network_sites s, generate_series(7, 12) hour`,
  `INSERT INTO class_dates (id, template_id, site_id, local_date, starts_at, ends_at, capacity, monitored_capacity)
     SELECT pg_temp.id_of('date' || s.nth || '-' || hour || '-' || day::date), pg_temp.id_of('class' || s.nth || '-' || hour), s.id,
            day::date, day + make_interval(hours => hour::int), day + make_interval(hours => hour::int + 1), 60, 60
       FROM network_sites s, generate_series(7, 12) hour,
            generate_series(current_date - 3650, current_date + 130, interval '1 day') day`,
  `INSERT INTO appointments (id, class_date_id, patient_id, enrollment_id, status, monitored, local_date, starts_at, ends_at, created_by)
     SELECT gen_random_uuid(), pg_temp.id_of('date' || c.nth || '-' || 7 + c.n % 6 || '-' || at.day), c.patient_id, c.course_id,
            CASE WHEN at.day >= current_date THEN 'booked' WHEN k < c.attended THEN 'fulfilled' WHEN k % 3 = 0 THEN 'noshow'
              ELSE 'cancelled' END::appointment_status,
            false, at.day, at.day + make_interval(hours => 7 + c.n % 6), at.day + make_interval(hours => 8 + c.n % 6), u.id
       FROM network c, generate_series(0, 33) k, LATERAL (SELECT c.first_on + 3 * k AS day) at,
            (SELECT id FROM users ORDER BY id LIMIT 1) u`,
  `UPDATE class_dates d SET booked = held.count
     FROM (SELECT class_date_id, count(*) FROM appointments WHERE status = 'booked' GROUP BY class_date_id) held
    WHERE d.id = held.class_date_id AND d.local_date > current_date`,
  `INSERT INTO prescriptions (id, patient_id, enrollment_id, status, inputs, result, policy_version, engine_version, created_by,
       signed_at, signed_by, activated_at)
     SELECT pg_temp.id_of('range' || c.n), c.patient_id, c.course_id, 'active', p.inputs, p.result, p.policy_version, p.engine_version,
            p.created_by, now(), p.created_by, now()
       FROM network c JOIN enrollments e ON e.id = c.course_id AND e.status = 'active',
            (SELECT * FROM prescriptions WHERE status = 'active' ORDER BY id LIMIT 1) p`,
  `INSERT INTO user_sites (user_id, site_id)
     SELECT r.user_id, s.id FROM user_roles r, network_sites s WHERE r.role = 'director' ON CONFLICT DO NOTHING`,
];

/** Fills a database that holds the demonstration; it is for measuring alone. @param url as the superuser */
export async function fillLargeNetwork(url: string): Promise<void> {
  const client = new pg.Client({ connectionString: url });
  await client.connect();
  try {
    for (const statement of [BEGIN, ...STATEMENTS, ...END]) await client.query(statement);
  } finally {
    await client.end();
  }
}
