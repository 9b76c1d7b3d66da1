-- What completion is measured against stays as it was when the first range of the course was signed.
CREATE FUNCTION enrollments_keep_planned() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (SELECT FROM prescriptions p WHERE p.enrollment_id = OLD.id AND p.signed_at IS NOT NULL) THEN
    RAISE EXCEPTION 'planned sessions are frozen at the first signed prescription'
      USING ERRCODE = 'restrict_violation', CONSTRAINT = 'enrollments_planned_frozen';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER enrollments_keep_planned BEFORE UPDATE OF planned_sessions ON enrollments FOR EACH ROW
  WHEN (OLD.planned_sessions IS DISTINCT FROM NEW.planned_sessions) EXECUTE FUNCTION enrollments_keep_planned();
