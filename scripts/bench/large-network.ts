import pg from 'pg';

/**
 * Ten years of a network of twelve sites, 34 appointments a course: every second patient belongs to the first two sites,
 * which the demonstration has. BENCH_COURSES: how many courses, 0 for the demonstration alone.
 */
export const COURSES = Number(process.env['BENCH_COURSES'] ?? 40_000);

/** Guards that count and check row by row what is made here as a whole; those that calls rest on are put back. */
const WITHOUT_GUARDS = `
  ALTER TABLE appointments DISABLE TRIGGER USER;
  ALTER TABLE appointments DROP CONSTRAINT appointments_no_overlap;
  ALTER TABLE appointments DROP CONSTRAINT appointments_class_date_id_class_dates_id_fk;
  ALTER TABLE appointments DROP CONSTRAINT appointments_patient_id_patients_id_fk;
  ALTER TABLE appointments DROP CONSTRAINT appointments_enrollment_id_enrollments_id_fk;
  ALTER TABLE appointments DROP CONSTRAINT appointments_created_by_users_id_fk`;

const WITH_GUARDS = `
  ALTER TABLE appointments ENABLE TRIGGER USER;
  ALTER TABLE appointments ADD CONSTRAINT appointments_no_overlap EXCLUDE USING gist (patient_id WITH =, during WITH &&)
    WHERE (status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow'))`;

/** Ids follow from what they are of, so that rows find each other by themselves. */
const STATEMENTS = [
  `INSERT INTO sites (id, name, time_zone, address, phone)
     SELECT gen_random_uuid(), 'Network site ' || n, 'America/New_York', n || ' Quay Street', '555-0100'
       FROM generate_series(1, 10) n`,
  `CREATE TEMP TABLE network_sites AS
     SELECT id, row_number() OVER (ORDER BY created_at, id) - 1 AS nth FROM sites`,
  `CREATE TEMP TABLE network AS
     SELECT n, md5('patient' || n)::uuid AS patient_id, md5('course' || n)::uuid AS course_id,
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
     SELECT md5('class' || s.nth || '-' || hour)::uuid, s.id, 'Network class ' || hour, 'FREQ=DAILY', current_date - 3650,
            make_time(hour::int, 0, 0), 60, 60, 60
       FROM network_sites s, generate_series(7, 12) hour`,
  `INSERT INTO class_dates (id, template_id, site_id, local_date, starts_at, ends_at, capacity, monitored_capacity)
     SELECT md5('date' || s.nth || '-' || hour || '-' || day::date)::uuid, md5('class' || s.nth || '-' || hour)::uuid, s.id,
            day::date, day + make_interval(hours => hour::int), day + make_interval(hours => hour::int + 1), 60, 60
       FROM network_sites s, generate_series(7, 12) hour,
            generate_series(current_date - 3650, current_date + 130, interval '1 day') day`,
  `INSERT INTO appointments (id, class_date_id, patient_id, enrollment_id, status, monitored, local_date, starts_at, ends_at, created_by)
     SELECT gen_random_uuid(), md5('date' || c.nth || '-' || 7 + c.n % 6 || '-' || at.day)::uuid, c.patient_id, c.course_id,
            CASE WHEN at.day >= current_date THEN 'booked' WHEN k < c.attended THEN 'fulfilled' WHEN k % 3 = 0 THEN 'noshow'
              ELSE 'cancelled' END::appointment_status,
            false, at.day, at.day + make_interval(hours => 7 + c.n % 6), at.day + make_interval(hours => 8 + c.n % 6), u.id
       FROM network c, generate_series(0, 33) k, LATERAL (SELECT c.first_on + 3 * k AS day) at,
            (SELECT id FROM users ORDER BY id LIMIT 1) u`,
  `INSERT INTO prescriptions (id, patient_id, enrollment_id, status, inputs, result, policy_version, engine_version, created_by,
       signed_at, signed_by, activated_at)
     SELECT md5('range' || c.n)::uuid, c.patient_id, c.course_id, 'active', p.inputs, p.result, p.policy_version, p.engine_version,
            p.created_by, now(), p.created_by, now()
       FROM network c JOIN enrollments e ON e.id = c.course_id AND e.status = 'active',
            (SELECT * FROM prescriptions WHERE status = 'active' ORDER BY id LIMIT 1) p`,
  `INSERT INTO user_sites (user_id, site_id)
     SELECT r.user_id, s.id FROM user_roles r, network_sites s WHERE r.role = 'director' ON CONFLICT DO NOTHING`,
  'ANALYZE',
];

/** Fills a migrated database that holds the demonstration; it is for measuring alone. @param ownerUrl as the migrations sign in */
export async function fillLargeNetwork(ownerUrl: string): Promise<void> {
  const owner = new pg.Client({ connectionString: ownerUrl });
  await owner.connect();
  try {
    for (const statement of [WITHOUT_GUARDS, ...STATEMENTS, WITH_GUARDS])
      await owner.query(statement);
  } finally {
    await owner.end();
  }
}
