-- Tells every server process, at commit, whose range or visit has changed: ids alone, for open pages to read again.
-- Readings are not told of: they are many, each telling commit waits for the one before, and the floor asks for them.
CREATE FUNCTION tell_of_patient() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  PERFORM pg_notify('plimsoll_changes',
    json_build_object('topic', TG_ARGV[0], 'patientId', p.id, 'siteId', p.site_id)::text)
    FROM patients p WHERE p.id = NEW.patient_id;
  RETURN NULL;
END $$;
--> statement-breakpoint
DO $$
DECLARE
  kept text;
BEGIN
  FOREACH kept IN ARRAY ARRAY['medications', 'medication_reviews', 'rhythm_records', 'cardiac_devices', 'thresholds',
    'clinical_events', 'exercise_tests', 'walk_tests', 'resting_rates', 'prescriptions', 'missed_doses'] LOOP
    EXECUTE format('CREATE TRIGGER %I AFTER INSERT OR UPDATE ON %I FOR EACH ROW EXECUTE FUNCTION tell_of_patient(''range'')',
      kept || '_tell', kept);
  END LOOP;
  FOREACH kept IN ARRAY ARRAY['session_records', 'exercise_bouts', 'progression_proposals'] LOOP
    EXECUTE format('CREATE TRIGGER %I AFTER INSERT OR UPDATE ON %I FOR EACH ROW EXECUTE FUNCTION tell_of_patient(''visit'')',
      kept || '_tell', kept);
  END LOOP;
END $$;
--> statement-breakpoint
CREATE TRIGGER appointments_tell AFTER UPDATE OF status ON appointments
  FOR EACH ROW WHEN (OLD.status IS DISTINCT FROM NEW.status) EXECUTE FUNCTION tell_of_patient('visit');
--> statement-breakpoint
-- A policy moves the days of review of every range.
CREATE FUNCTION tell_of_policy() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  PERFORM pg_notify('plimsoll_changes', '{"topic":"range","patientId":null,"siteId":null}');
  RETURN NULL;
END $$;
--> statement-breakpoint
CREATE TRIGGER policies_tell AFTER INSERT ON policies FOR EACH STATEMENT EXECUTE FUNCTION tell_of_policy();
--> statement-breakpoint
CREATE FUNCTION exercise_bouts_keep() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'work once recorded never changes' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'exercise_bouts_kept';
END $$;
--> statement-breakpoint
CREATE TRIGGER exercise_bouts_keep BEFORE UPDATE OR DELETE ON exercise_bouts
  FOR EACH ROW EXECUTE FUNCTION exercise_bouts_keep();
--> statement-breakpoint
-- A proposal is decided once, and never changes otherwise.
CREATE FUNCTION progression_proposals_keep() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  decision_keys text[] := ARRAY['decision', 'decided_load', 'decision_reason', 'decided_at', 'decided_by'];
BEGIN
  IF TG_OP = 'DELETE' OR OLD.decision IS NOT NULL
     OR (to_jsonb(NEW) - decision_keys) IS DISTINCT FROM (to_jsonb(OLD) - decision_keys) THEN
    RAISE EXCEPTION 'a proposal is decided once' USING ERRCODE = 'restrict_violation', CONSTRAINT = 'progression_proposals_kept';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER progression_proposals_keep BEFORE UPDATE OR DELETE ON progression_proposals
  FOR EACH ROW EXECUTE FUNCTION progression_proposals_keep();
