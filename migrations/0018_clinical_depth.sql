CREATE TABLE "chair_stands" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"seconds" real,
	"ending" text NOT NULL,
	"performed_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "chair_stands_seconds" CHECK ("chair_stands"."seconds" between 3 and 300),
	CONSTRAINT "chair_stands_ending" CHECK ("chair_stands"."ending" in ('standing-fifth-time', 'seated-fifth-time'))
);
--> statement-breakpoint
CREATE TABLE "questionnaire_answers" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"instrument" text NOT NULL,
	"answers" jsonb NOT NULL,
	"answered_on" date NOT NULL,
	"self_harm" boolean GENERATED ALWAYS AS (instrument = 'phq-9' and coalesce(answers ->> 8, '0') in ('1', '2', '3')) STORED NOT NULL,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	"ended_reason" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "questionnaire_answers_length" CHECK (jsonb_array_length("questionnaire_answers"."answers") = case "questionnaire_answers"."instrument" when 'phq-2' then 2 when 'phq-9' then 9 when 'gad-7' then 7 when 'dasi' then 12 else -1 end),
	CONSTRAINT "questionnaire_answers_closed_by_someone" CHECK (num_nulls("questionnaire_answers"."ended_at", "questionnaire_answers"."ended_by", "questionnaire_answers"."ended_reason") in (0, 3)),
	CONSTRAINT "questionnaire_answers_closed_follow_up" CHECK ("questionnaire_answers"."ended_at" is null or "questionnaire_answers"."self_harm")
);
--> statement-breakpoint
CREATE TABLE "resting_ecgs" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"hindrances" text[] NOT NULL,
	"observed_on" date NOT NULL,
	"note" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "restrictions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"limit" real,
	"diastolic" real,
	"detail" text NOT NULL,
	"ordered_by" text NOT NULL,
	"ordered_on" date NOT NULL,
	"until" date,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	"ended_reason" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "restrictions_kind" CHECK ("restrictions"."kind" in ('sternum', 'device-arm', 'joint', 'fall', 'lifting', 'oxygen', 'pressure', 'claudication')),
	CONSTRAINT "restrictions_order" CHECK ("restrictions"."until" >= "restrictions"."ordered_on"),
	CONSTRAINT "restrictions_limit" CHECK (("restrictions"."kind" in ('lifting', 'oxygen', 'pressure')) = ("restrictions"."limit" is not null)),
	CONSTRAINT "restrictions_pressure" CHECK ("restrictions"."diastolic" is null or ("restrictions"."kind" = 'pressure' and "restrictions"."diastolic" < "restrictions"."limit")),
	CONSTRAINT "restrictions_lifted_by_someone" CHECK (num_nulls("restrictions"."ended_at", "restrictions"."ended_by", "restrictions"."ended_reason") in (0, 3))
);
--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD COLUMN "pacing_mode" text;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD COLUMN "lower_rate" real;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD COLUMN "upper_sensor_rate" real;--> statement-breakpoint
ALTER TABLE "conditions" ADD COLUMN "since" date;--> statement-breakpoint
ALTER TABLE "conditions" ADD COLUMN "evidence" text;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "protocol_kind" text DEFAULT 'other' NOT NULL;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "peak_systolic" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "peak_diastolic" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "peak_exertion" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "exercise_minutes" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "stages" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "gait" text;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "handrail" boolean;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "effort" text;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "recovery_one" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "recovery_two" real;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "recovery_posture" text;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "signs" jsonb DEFAULT '[]'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD COLUMN "drugs_taken" jsonb;--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "salt" text;--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "flags" text[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "times" text[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD COLUMN "findings" jsonb DEFAULT '{}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD COLUMN "ejection_fraction" real;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD COLUMN "capacity" real;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD COLUMN "override_reason" text;--> statement-breakpoint
ALTER TABLE "thresholds" ADD COLUMN "superseded_by_test_id" uuid;--> statement-breakpoint
ALTER TABLE "chair_stands" ADD CONSTRAINT "chair_stands_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chair_stands" ADD CONSTRAINT "chair_stands_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "chair_stands" ADD CONSTRAINT "chair_stands_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questionnaire_answers" ADD CONSTRAINT "questionnaire_answers_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questionnaire_answers" ADD CONSTRAINT "questionnaire_answers_ended_by_users_id_fk" FOREIGN KEY ("ended_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questionnaire_answers" ADD CONSTRAINT "questionnaire_answers_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "questionnaire_answers" ADD CONSTRAINT "questionnaire_answers_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_ecgs" ADD CONSTRAINT "resting_ecgs_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_ecgs" ADD CONSTRAINT "resting_ecgs_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_ecgs" ADD CONSTRAINT "resting_ecgs_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "restrictions" ADD CONSTRAINT "restrictions_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "restrictions" ADD CONSTRAINT "restrictions_ended_by_users_id_fk" FOREIGN KEY ("ended_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "restrictions" ADD CONSTRAINT "restrictions_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "restrictions" ADD CONSTRAINT "restrictions_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "chair_stands_patient" ON "chair_stands" USING btree ("patient_id","performed_on");--> statement-breakpoint
CREATE INDEX "questionnaire_answers_patient" ON "questionnaire_answers" USING btree ("patient_id","answered_on");--> statement-breakpoint
CREATE INDEX "questionnaire_answers_follow_up" ON "questionnaire_answers" USING btree ("recorded_at") WHERE self_harm and ended_at is null and entered_in_error_at is null;--> statement-breakpoint
CREATE INDEX "resting_ecgs_patient" ON "resting_ecgs" USING btree ("patient_id","observed_on");--> statement-breakpoint
CREATE INDEX "restrictions_patient" ON "restrictions" USING btree ("patient_id","ordered_on");--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_superseded_by_test_id_exercise_tests_id_fk" FOREIGN KEY ("superseded_by_test_id") REFERENCES "public"."exercise_tests"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_lower" CHECK ("cardiac_devices"."lower_rate" between 30 and 150);--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_sensor" CHECK ("cardiac_devices"."upper_sensor_rate" between 50 and 220);--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_order" CHECK ("cardiac_devices"."lower_rate" is null or ("cardiac_devices"."lower_rate" < coalesce("cardiac_devices"."upper_tracking_rate", 999) and "cardiac_devices"."lower_rate" < coalesce("cardiac_devices"."upper_sensor_rate", 999)));--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_paces" CHECK ("cardiac_devices"."pacemaker" or ("cardiac_devices"."pacing_mode" is null and "cardiac_devices"."lower_rate" is null and "cardiac_devices"."upper_sensor_rate" is null));--> statement-breakpoint
ALTER TABLE "conditions" ADD CONSTRAINT "conditions_recovered_by_evidence" CHECK ("conditions"."kind" <> 'transplant' or "conditions"."value" <> 'recovered' or "conditions"."evidence" is not null) NOT VALID;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_pressure" CHECK ("exercise_tests"."peak_diastolic" is null or ("exercise_tests"."peak_systolic" is not null and "exercise_tests"."peak_diastolic" < "exercise_tests"."peak_systolic"));--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_bounds" CHECK ("exercise_tests"."peak_systolic" between 50 and 300 and "exercise_tests"."peak_diastolic" between 20 and 200 and "exercise_tests"."peak_exertion" between 6 and 20 and "exercise_tests"."exercise_minutes" between 0.1 and 60 and "exercise_tests"."recovery_one" between 30 and 230 and "exercise_tests"."recovery_two" between 30 and 230);--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_lists" CHECK (jsonb_typeof("exercise_tests"."stages") = 'array' and jsonb_typeof("exercise_tests"."signs") = 'array' and coalesce(jsonb_typeof("exercise_tests"."drugs_taken"), 'array') in ('array', 'null'));--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_treadmill" CHECK ("exercise_tests"."mode" = 'treadmill' or ("exercise_tests"."gait" is null and "exercise_tests"."handrail" is null));--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_words" CHECK ("exercise_tests"."gait" in ('walk', 'run') and "exercise_tests"."effort" in ('maximal', 'submaximal') and "exercise_tests"."recovery_posture" in ('upright', 'seated', 'supine'));--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_flags" CHECK ("medications"."flags" <@ array['anticoagulant', 'nitrate', 'glucose-lowering']);--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_times" CHECK ("medications"."times" <@ array['morning', 'noon', 'evening', 'bedtime', 'as-needed']);--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_ejection" CHECK ("risk_stratifications"."ejection_fraction" between 5 and 90);--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_capacity" CHECK ("risk_stratifications"."capacity" between 1 and 25);--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_low_is_whole" CHECK ("risk_stratifications"."level" <> 'low' or (jsonb_array_length(jsonb_path_query_array("risk_stratifications"."findings", '$.* ? (@ != null)')) = 14 and "risk_stratifications"."ejection_fraction" is not null and "risk_stratifications"."capacity" is not null)) NOT VALID;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_superseded_by_test" CHECK ("thresholds"."superseded_by_test_id" is null or "thresholds"."status" = 'superseded');--> statement-breakpoint
-- An order is followed on the floor as soon as it is saved.
CREATE TRIGGER restrictions_tell AFTER INSERT OR UPDATE ON restrictions
  FOR EACH ROW EXECUTE FUNCTION tell_of_patient('visit');
