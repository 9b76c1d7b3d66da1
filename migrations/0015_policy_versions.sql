ALTER TABLE "policies" ADD COLUMN "training" jsonb DEFAULT '{}'::jsonb NOT NULL;
--> statement-breakpoint
ALTER TABLE policies ADD CONSTRAINT policies_created_by_users_id_fk FOREIGN KEY (created_by) REFERENCES users (id);
--> statement-breakpoint
-- Within what each number of the policy is set; the same as in shared/clinical/program-policy, which a spec holds.
CREATE FUNCTION policy_bounds() RETURNS TABLE (key text, lowest numeric, highest numeric, step numeric, required boolean)
LANGUAGE sql IMMUTABLE AS $$
  SELECT * FROM (VALUES
    ('intensity.wide.lower', 0.2, 0.9, 0.01, true),
    ('intensity.wide.upper', 0.2, 0.9, 0.01, true),
    ('intensity.narrow.lower', 0.2, 0.9, 0.01, true),
    ('intensity.narrow.upper', 0.2, 0.9, 0.01, true),
    ('intensity.lowCapacity.lower', 0.2, 0.9, 0.01, true),
    ('intensity.lowCapacity.upper', 0.2, 0.9, 0.01, true),
    ('percentOfPeak.lower', 0.5, 0.9, 0.01, true),
    ('percentOfPeak.upper', 0.5, 0.9, 0.01, true),
    ('restingPlus.lower', 10, 30, 1, true),
    ('restingPlus.upper', 10, 30, 1, true),
    ('askLine.above', 5, 20, 1, true),
    ('test.validDays', 30, 365, 1, true),
    ('restingPlus.cap', 100, 140, 1, true),
    ('margin.ischemia', 10, 30, 1, true),
    ('margin.angina', 10, 30, 1, true),
    ('margin.arrhythmia', 10, 30, 1, true),
    ('margin.bloodPressure', 10, 30, 1, true),
    ('margin.symptom', 10, 30, 1, true),
    ('margin.icd', 10, 30, 1, true),
    ('margin.tracking', 10, 30, 1, true),
    ('range.minimumWidth', 4, 20, 1, true),
    ('reserve.minimum', 10, 50, 1, true),
    ('resting.maximumSpread', 5, 30, 1, true),
    ('reviewDueDays', 7, 90, 1, true),
    ('arm.rateBelowLegs', 5, 15, 1, true),
    ('arm.workFraction', 0.3, 0.6, 0.01, true),
    ('walk.startFraction', 0.5, 0.9, 0.01, true),
    ('pressureCeiling.systolic', 100, 180, 1, true),
    ('pressureCeiling.diastolic', 60, 110, 1, true),
    ('oxygenFloor', 85, 94, 1, true),
    ('equipment.treadmill.speedMph', 0.1, 0.5, 0.1, true),
    ('equipment.treadmill.gradePercent', 0.1, 2.5, 0.1, true),
    ('equipment.cycle.power', 1, 25, 1, true),
    ('equipment.arm.power', 1, 25, 1, true),
    ('equipment.step.lowest', 0.04, 0.4, 0.01, true),
    ('equipment.step.highest', 0.04, 0.4, 0.01, true),
    ('equipment.step.by', 0.01, 0.1, 0.01, true),
    ('sessionShape.supervisedPerWeek', 1, 5, 1, false),
    ('sessionShape.homePerWeek', 0, 6, 1, false),
    ('sessionShape.conditioningMinutes', 10, 60, 1, false),
    ('sessionShape.warmUpMinutes', 5, 20, 1, false),
    ('sessionShape.coolDownMinutes', 5, 20, 1, false),
    ('intermittent.underMets', 2, 5, 1, false),
    ('intermittent.underMinutes', 5, 20, 1, false),
    ('intermittent.boutMinutes', 1, 10, 1, false),
    ('intermittent.restMinutes', 1, 5, 1, false),
    ('intermittent.totalMinutes', 10, 30, 1, false),
    ('intermittent.mostMinutes', 20, 45, 1, false),
    ('intermittent.stepMinutes', 1, 5, 1, false),
    ('intervals.shortBoutMinutes', 2, 4, 1, false),
    ('intervals.physicianAbove', 0.5, 0.8, 0.01, false),
    ('intervals.highestFraction', 0.6, 0.95, 0.01, false),
    ('intervals.recoveryHighest', 0.2, 0.6, 0.01, false),
    ('intervals.longestWorkMinutes', 1, 5, 1, false),
    ('intervals.highestEffort', 13, 17, 1, false),
    ('intervals.firstProgramWeek', 1, 12, 1, false),
    ('intervals.warmUpMinutes', 5, 15, 1, false),
    ('resistance.afterSternotomy', 3, 8, 1, false),
    ('resistance.upperAfterSternotomy', 8, 16, 1, false),
    ('resistance.afterInfarction', 3, 8, 1, false),
    ('resistance.afterStent', 2, 6, 1, false),
    ('resistance.afterDevice', 4, 8, 1, false),
    ('resistance.supervisedFirst', 1, 6, 1, false),
    ('resistance.lightLoad', 0.5, 4.5, 0.1, false),
    ('resistance.deviceLoad', 0.5, 4.5, 0.1, false),
    ('resistance.upperStart', 0.2, 0.5, 0.01, false),
    ('resistance.lowerStart', 0.3, 0.6, 0.01, false),
    ('resistance.leastRepetitions', 5, 12, 1, false),
    ('resistance.mostRepetitions', 8, 20, 1, false),
    ('resistance.mostSets', 1, 4, 1, false),
    ('resistance.highestEffort', 11, 15, 1, false),
    ('resistance.loadStep', 0.02, 0.1, 0.01, false),
    ('progression.sessionsNeeded', 1, 6, 1, false),
    ('progression.leastReadings', 1, 6, 1, false),
    ('progression.goalMinutes', 20, 60, 1, false),
    ('progression.minutesStep', 1, 10, 1, false),
    ('progression.metsStep', 0.2, 1, 0.1, false),
    ('progression.mostIncrease', 0.05, 0.2, 0.01, false),
    ('progression.easierStep', 0.2, 1.5, 0.1, false),
    ('progression.effortRoom', 0, 3, 1, false),
    ('progression.rateRoom', 0, 10, 1, false),
    ('progression.absenceDays', 7, 28, 1, false),
    ('progression.repeatedSessions', 2, 5, 1, false),
    ('staffing.patientsEach', 3, 15, 1, false),
    ('staffing.highRiskEach', 1, 5, 1, false),
    ('staffing.leastStaff', 1, 4, 1, false)
  ) AS bounds
$$;
--> statement-breakpoint
-- Which number must stay below which other.
CREATE FUNCTION policy_orders() RETURNS TABLE (lower_key text, upper_key text, may_be_equal boolean)
LANGUAGE sql IMMUTABLE AS $$
  SELECT * FROM (VALUES
    ('intensity.wide.lower', 'intensity.wide.upper', false),
    ('intensity.narrow.lower', 'intensity.narrow.upper', false),
    ('intensity.lowCapacity.lower', 'intensity.lowCapacity.upper', false),
    ('percentOfPeak.lower', 'percentOfPeak.upper', false),
    ('restingPlus.lower', 'restingPlus.upper', false),
    ('pressureCeiling.diastolic', 'pressureCeiling.systolic', false),
    ('equipment.step.lowest', 'equipment.step.highest', true),
    ('intermittent.boutMinutes', 'intermittent.totalMinutes', true),
    ('intermittent.totalMinutes', 'intermittent.mostMinutes', true),
    ('intervals.recoveryHighest', 'intervals.highestFraction', false),
    ('intervals.physicianAbove', 'intervals.highestFraction', true),
    ('resistance.afterSternotomy', 'resistance.upperAfterSternotomy', true),
    ('resistance.leastRepetitions', 'resistance.mostRepetitions', true),
    ('staffing.highRiskEach', 'staffing.patientsEach', true)
  ) AS orders
$$;
--> statement-breakpoint
-- Every number of a document by its key, joined with dots; null where something else stands than a number.
CREATE FUNCTION policy_numbers(document jsonb) RETURNS TABLE (key text, value numeric) LANGUAGE sql IMMUTABLE AS $$
  WITH RECURSIVE part (key, node) AS (
    SELECT e.key, e.value FROM jsonb_each(document) AS e
    UNION ALL
    SELECT part.key || '.' || e.key, e.value FROM part
      CROSS JOIN LATERAL jsonb_each(CASE WHEN jsonb_typeof(part.node) = 'object' THEN part.node ELSE '{}' END) AS e
  )
  SELECT part.key, CASE WHEN jsonb_typeof(node) = 'number' THEN node::text::numeric END
    FROM part WHERE jsonb_typeof(node) <> 'object'
$$;
--> statement-breakpoint
CREATE FUNCTION policies_bounds() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  document jsonb := (NEW.content - 'version') || NEW.training;
  wrong text;
BEGIN
  IF (NEW.content ->> 'version') IS DISTINCT FROM NEW.version::text THEN
    wrong := 'version';
  END IF;
  SELECT coalesce(wrong, min(coalesce(n.key, b.key))) INTO wrong
    FROM policy_numbers(document) n FULL JOIN policy_bounds() b USING (key)
   WHERE (n.key IS NULL AND b.required) OR b.key IS NULL
      OR (n.key IS NOT NULL AND (n.value IS NULL OR n.value NOT BETWEEN b.lowest AND b.highest OR mod(n.value, b.step) <> 0));
  SELECT coalesce(wrong, min(o.upper_key)) INTO wrong
    FROM policy_orders() o
    JOIN policy_numbers(document) l ON l.key = o.lower_key
    JOIN policy_numbers(document) u ON u.key = o.upper_key
   WHERE l.value > u.value OR (l.value = u.value AND NOT o.may_be_equal);
  IF wrong IS NOT NULL THEN
    RAISE EXCEPTION 'the policy may not hold %', wrong USING ERRCODE = 'check_violation', CONSTRAINT = 'policies_within_bounds';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER policies_bounds BEFORE INSERT ON policies FOR EACH ROW EXECUTE FUNCTION policies_bounds();
--> statement-breakpoint
-- A version that was published stays as it was: prescriptions name it.
CREATE TRIGGER policies_append_only BEFORE UPDATE OR DELETE OR TRUNCATE ON policies FOR EACH STATEMENT EXECUTE FUNCTION refuse_change();
