-- What tables alone cannot say. Ranges need btree_gist, which PostgreSQL trusts a database's owner to add.
CREATE EXTENSION IF NOT EXISTS btree_gist;
--> statement-breakpoint
-- One patient is never in two overlapping classes.
ALTER TABLE appointments ADD CONSTRAINT appointments_no_overlap
  EXCLUDE USING gist (patient_id WITH =, during WITH &&)
  WHERE (status IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow'));
--> statement-breakpoint
CREATE FUNCTION holds_place(s appointment_status) RETURNS boolean LANGUAGE sql IMMUTABLE AS
$$ SELECT s IN ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow') $$;
--> statement-breakpoint
-- Taken before any class date is locked, so that two bookings of one patient queue instead of deadlocking.
CREATE FUNCTION lock_patient_booking(patient uuid) RETURNS void LANGUAGE sql AS
$$ SELECT pg_advisory_xact_lock(hashtextextended(patient::text, 36)) $$;
--> statement-breakpoint
-- An appointment's times are its class date's, never typed; its course is its patient's.
CREATE FUNCTION appointments_fill() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF holds_place(NEW.status) THEN
    PERFORM lock_patient_booking(NEW.patient_id);
  END IF;
  IF TG_OP = 'INSERT' OR NEW.class_date_id <> OLD.class_date_id THEN
    SELECT d.local_date, d.starts_at, d.ends_at INTO NEW.local_date, NEW.starts_at, NEW.ends_at
      FROM class_dates d WHERE d.id = NEW.class_date_id;
  END IF;
  IF TG_OP = 'INSERT' AND NOT EXISTS (
    SELECT 1 FROM enrollments e WHERE e.id = NEW.enrollment_id AND e.patient_id = NEW.patient_id
  ) THEN
    RAISE EXCEPTION 'the course is another patient''s' USING ERRCODE = 'check_violation', CONSTRAINT = 'appointments_own_course';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER appointments_fill BEFORE INSERT OR UPDATE OF status, class_date_id ON appointments
  FOR EACH ROW EXECUTE FUNCTION appointments_fill();
--> statement-breakpoint
-- Adds `step` (1 or -1) to the counters that one place counts in, class date first; their CHECKs refuse the place too many.
CREATE FUNCTION count_place(a appointments, step integer) RETURNS void LANGUAGE plpgsql AS $$
DECLARE
  date_status class_date_status;
  course_status enrollment_status;
  day_limit integer;
BEGIN
  UPDATE class_dates
    SET booked = booked + step, monitored_booked = monitored_booked + CASE WHEN a.monitored THEN step ELSE 0 END
    WHERE id = a.class_date_id RETURNING status INTO date_status;
  IF step > 0 AND date_status <> 'scheduled' THEN
    RAISE EXCEPTION 'the class date is not open' USING ERRCODE = 'check_violation', CONSTRAINT = 'class_dates_open';
  END IF;
  UPDATE enrollments SET booked = booked + step WHERE id = a.enrollment_id
    RETURNING status, daily_limit INTO course_status, day_limit;
  IF step > 0 AND course_status <> 'active' THEN
    RAISE EXCEPTION 'the course is not active' USING ERRCODE = 'check_violation', CONSTRAINT = 'enrollments_active';
  END IF;
  IF step > 0 THEN
    INSERT INTO patient_days AS day (patient_id, local_date, booked, daily_limit)
      VALUES (a.patient_id, a.local_date, 1, day_limit)
      ON CONFLICT (patient_id, local_date) DO UPDATE SET booked = day.booked + 1, daily_limit = EXCLUDED.daily_limit;
  ELSE
    UPDATE patient_days SET booked = booked - 1 WHERE patient_id = a.patient_id AND local_date = a.local_date;
  END IF;
END $$;
--> statement-breakpoint
-- Sessions attended, told anew from the facts of one course (at most 72 rows): the first may be signed last.
CREATE FUNCTION count_attendance(course uuid) RETURNS void LANGUAGE sql AS $$
  WITH session AS (
    SELECT a.local_date, min(a.local_date) OVER () AS first_on
      FROM appointments a
      JOIN class_dates d ON d.id = a.class_date_id
      JOIN class_templates t ON t.id = d.template_id
      WHERE a.enrollment_id = course AND a.status = 'fulfilled' AND a.exercised AND t.kind = 'exercise'
  )
  UPDATE enrollments e SET (attended, attended_in_window, first_session_on, last_session_on) = (
    SELECT count(*), count(*) FILTER (WHERE s.local_date <= s.first_on + 252), min(s.local_date), max(s.local_date) FROM session s
  ) WHERE e.id = course
$$;
--> statement-breakpoint
CREATE FUNCTION appointments_count() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  held boolean := TG_OP <> 'INSERT' AND holds_place(OLD.status);
  holds boolean := TG_OP <> 'DELETE' AND holds_place(NEW.status);
BEGIN
  IF held AND (NOT holds OR OLD.class_date_id <> NEW.class_date_id OR OLD.monitored <> NEW.monitored) THEN
    PERFORM count_place(OLD, -1);
  END IF;
  IF holds AND (NOT held OR OLD.class_date_id <> NEW.class_date_id OR OLD.monitored <> NEW.monitored) THEN
    PERFORM count_place(NEW, 1);
  END IF;
  IF (TG_OP <> 'INSERT' AND OLD.status = 'fulfilled') OR (TG_OP <> 'DELETE' AND NEW.status = 'fulfilled') THEN
    PERFORM count_attendance(CASE WHEN TG_OP = 'DELETE' THEN OLD.enrollment_id ELSE NEW.enrollment_id END);
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER appointments_count AFTER INSERT OR DELETE OR UPDATE OF status, class_date_id, monitored, exercised ON appointments
  FOR EACH ROW EXECUTE FUNCTION appointments_count();
--> statement-breakpoint
-- Records that may only grow.
CREATE FUNCTION refuse_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION '% is append-only', TG_TABLE_NAME USING ERRCODE = 'restrict_violation';
END $$;
--> statement-breakpoint
CREATE TRIGGER audit_events_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_events FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER audit_seals_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON audit_seals FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER ledger_entries_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON ledger_entries FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER payment_events_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON payment_events FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- The entries of a journal balance when its transaction ends.
CREATE FUNCTION ledger_balanced() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (
    SELECT 1 FROM ledger_entries WHERE journal_id = NEW.journal_id
      GROUP BY currency HAVING sum(debit_minor) <> sum(credit_minor)
  ) THEN
    RAISE EXCEPTION 'journal % does not balance', NEW.journal_id USING ERRCODE = 'check_violation', CONSTRAINT = 'ledger_entries_balanced';
  END IF;
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER ledger_entries_balanced AFTER INSERT ON ledger_entries
  DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION ledger_balanced();
--> statement-breakpoint
-- A signed prescription never changes: a physician may add a signature, and its life may end.
CREATE FUNCTION prescriptions_keep() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF OLD.signed_at IS NULL THEN
    RETURN CASE WHEN TG_OP = 'DELETE' THEN OLD ELSE NEW END;
  END IF;
  IF TG_OP = 'DELETE'
    OR (to_jsonb(NEW) - '{status,version,awaiting,physician_signed_at,physician_signed_by,activated_at,ended_at}'::text[])
       IS DISTINCT FROM
       (to_jsonb(OLD) - '{status,version,awaiting,physician_signed_at,physician_signed_by,activated_at,ended_at}'::text[])
    OR (OLD.physician_signed_at IS NOT NULL
        AND (NEW.physician_signed_at, NEW.physician_signed_by) IS DISTINCT FROM (OLD.physician_signed_at, OLD.physician_signed_by))
    OR (OLD.activated_at IS NOT NULL AND NEW.activated_at IS DISTINCT FROM OLD.activated_at)
    OR (OLD.status <> 'draft' AND NEW.status = 'draft')
    OR (OLD.status IN ('completed', 'revoked', 'entered-in-error') AND NEW.status = 'active')
  THEN
    RAISE EXCEPTION 'a signed prescription never changes' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'prescriptions_signed_is_kept';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER prescriptions_keep BEFORE UPDATE OR DELETE ON prescriptions FOR EACH ROW EXECUTE FUNCTION prescriptions_keep();
--> statement-breakpoint
CREATE TRIGGER prescriptions_no_truncate BEFORE TRUNCATE ON prescriptions FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
-- A reading once acknowledged is never overwritten: only its status may tell that it was amended.
CREATE FUNCTION vital_signs_keep() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'INSERT' THEN
    IF NEW.amends IS NULL AND EXISTS (
      SELECT 1 FROM session_records r WHERE r.id = NEW.session_record_id AND r.signed_at IS NOT NULL FOR SHARE
    ) THEN
      RAISE EXCEPTION 'the record is signed' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'vital_signs_record_open';
    END IF;
    RETURN NEW;
  END IF;
  IF TG_OP = 'DELETE' OR (to_jsonb(NEW) - 'status') IS DISTINCT FROM (to_jsonb(OLD) - 'status') THEN
    RAISE EXCEPTION 'a reading never changes' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'vital_signs_kept';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER vital_signs_keep BEFORE INSERT OR UPDATE OR DELETE ON vital_signs FOR EACH ROW EXECUTE FUNCTION vital_signs_keep();
--> statement-breakpoint
CREATE TRIGGER vital_signs_no_truncate BEFORE TRUNCATE ON vital_signs FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE FUNCTION session_records_keep() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF TG_OP = 'DELETE' OR OLD.signed_at IS NOT NULL
    OR (to_jsonb(NEW) - '{signed_at,signed_by,exercised}'::text[]) IS DISTINCT FROM (to_jsonb(OLD) - '{signed_at,signed_by,exercised}'::text[])
  THEN
    RAISE EXCEPTION 'a session record never changes but by its signature' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'session_records_kept';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER session_records_keep BEFORE UPDATE OR DELETE ON session_records FOR EACH ROW EXECUTE FUNCTION session_records_keep();
--> statement-breakpoint
CREATE TRIGGER session_records_no_truncate BEFORE TRUNCATE ON session_records FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
