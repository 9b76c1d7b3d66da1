CREATE TYPE "public"."audit_outcome" AS ENUM('success', 'refused', 'failure');--> statement-breakpoint
CREATE TYPE "public"."role" AS ENUM('patient', 'nurse', 'exercise-physiologist', 'physician', 'front-desk', 'director', 'administrator');--> statement-breakpoint
CREATE TYPE "public"."token_purpose" AS ENUM('password-reset', 'invitation', 'first-administrator');--> statement-breakpoint
CREATE TYPE "public"."charge_status" AS ENUM('open', 'paid', 'void', 'refunded');--> statement-breakpoint
CREATE TYPE "public"."ledger_account" AS ENUM('receivable', 'income', 'cash', 'refunds');--> statement-breakpoint
CREATE TYPE "public"."payment_status" AS ENUM('preparing', 'pending', 'settled', 'failed', 'expired');--> statement-breakpoint
CREATE TYPE "public"."refund_status" AS ENUM('pending', 'settled', 'failed');--> statement-breakpoint
CREATE TYPE "public"."appointment_status" AS ENUM('proposed', 'pending', 'booked', 'arrived', 'checked-in', 'fulfilled', 'cancelled', 'noshow', 'waitlist', 'entered-in-error');--> statement-breakpoint
CREATE TYPE "public"."icd_status" AS ENUM('none', 'present', 'unknown');--> statement-breakpoint
CREATE TYPE "public"."rate_acting_class" AS ENUM('beta-blocker', 'ivabradine', 'diltiazem-verapamil', 'digoxin', 'amiodarone-sotalol', 'thyroid-hormone', 'other');--> statement-breakpoint
CREATE TYPE "public"."rhythm" AS ENUM('sinus', 'sinus-tracked', 'sensor-paced', 'fixed-paced', 'atrial-fibrillation', 'atrial-flutter', 'frequent-ectopy', 'high-grade-block');--> statement-breakpoint
CREATE TYPE "public"."risk_level" AS ENUM('low', 'moderate', 'high', 'unknown');--> statement-breakpoint
CREATE TYPE "public"."test_end" AS ENUM('fatigue', 'dyspnea', 'angina', 'st-change', 'arrhythmia', 'blood-pressure', 'claudication', 'orthopedic', 'protocol-end', 'target-rate', 'other');--> statement-breakpoint
CREATE TYPE "public"."test_mode" AS ENUM('treadmill', 'cycle', 'arm');--> statement-breakpoint
CREATE TYPE "public"."threshold_kind" AS ENUM('ischemia', 'angina', 'arrhythmia', 'blood-pressure', 'symptom');--> statement-breakpoint
CREATE TYPE "public"."threshold_status" AS ENUM('active', 'superseded', 'retired');--> statement-breakpoint
CREATE TYPE "public"."vo2_source" AS ENUM('measured', 'estimated');--> statement-breakpoint
CREATE TYPE "public"."observation_status" AS ENUM('preliminary', 'final', 'amended', 'entered-in-error');--> statement-breakpoint
CREATE TYPE "public"."placement" AS ENUM('below', 'in', 'above', 'over-ceiling');--> statement-breakpoint
CREATE TYPE "public"."vital_phase" AS ENUM('resting', 'exercise', 'recovery');--> statement-breakpoint
CREATE TYPE "public"."outbox_status" AS ENUM('pending', 'sending', 'sent', 'uncertain', 'cancelled', 'failed');--> statement-breakpoint
CREATE TYPE "public"."diagnosis_kind" AS ENUM('heart-attack', 'stent', 'bypass', 'valve', 'transplant', 'stable-angina', 'heart-failure', 'assist-device', 'other');--> statement-breakpoint
CREATE TYPE "public"."enrollment_status" AS ENUM('active', 'on-hold', 'completed', 'discontinued');--> statement-breakpoint
CREATE TYPE "public"."sex_at_birth" AS ENUM('female', 'male', 'unknown');--> statement-breakpoint
CREATE TYPE "public"."prescription_status" AS ENUM('draft', 'active', 'completed', 'revoked', 'entered-in-error');--> statement-breakpoint
CREATE TYPE "public"."class_date_status" AS ENUM('scheduled', 'closed', 'cancelled');--> statement-breakpoint
CREATE TYPE "public"."class_kind" AS ENUM('exercise', 'orientation', 'education');--> statement-breakpoint
CREATE TABLE "audit_events" (
	"sequence" bigint GENERATED ALWAYS AS IDENTITY (sequence name "audit_events_sequence_seq" INCREMENT BY 1 MINVALUE 1 MAXVALUE 9223372036854775807 START WITH 1 CACHE 1),
	"id" uuid PRIMARY KEY NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"actor_id" uuid,
	"action" text NOT NULL,
	"object_type" text NOT NULL,
	"object_id" text,
	"patient_id" uuid,
	"ip" text,
	"session_hash" text,
	"outcome" "audit_outcome" DEFAULT 'success' NOT NULL,
	"details" jsonb
);
--> statement-breakpoint
CREATE TABLE "audit_seals" (
	"id" uuid PRIMARY KEY NOT NULL,
	"from_sequence" bigint NOT NULL,
	"to_sequence" bigint NOT NULL,
	"digest" text NOT NULL,
	"previous_digest" text,
	"sealed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "audit_seals_range" CHECK ("audit_seals"."to_sequence" >= "audit_seals"."from_sequence")
);
--> statement-breakpoint
CREATE TABLE "idempotency_keys" (
	"user_id" uuid NOT NULL,
	"key" text NOT NULL,
	"route" text NOT NULL,
	"request_hash" text NOT NULL,
	"status" integer NOT NULL,
	"response" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "idempotency_keys_user_id_key_pk" PRIMARY KEY("user_id","key"),
	CONSTRAINT "idempotency_keys_length" CHECK (char_length("idempotency_keys"."key") between 1 and 255)
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"sid" text PRIMARY KEY NOT NULL,
	"sess" jsonb NOT NULL,
	"expire" timestamp with time zone NOT NULL,
	"user_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "user_roles" (
	"user_id" uuid NOT NULL,
	"role" "role" NOT NULL,
	"granted_at" timestamp with time zone DEFAULT now() NOT NULL,
	"granted_by" uuid,
	CONSTRAINT "user_roles_user_id_role_pk" PRIMARY KEY("user_id","role")
);
--> statement-breakpoint
CREATE TABLE "user_sites" (
	"user_id" uuid NOT NULL,
	"site_id" uuid NOT NULL,
	CONSTRAINT "user_sites_user_id_site_id_pk" PRIMARY KEY("user_id","site_id")
);
--> statement-breakpoint
CREATE TABLE "user_tokens" (
	"id" uuid PRIMARY KEY NOT NULL,
	"purpose" "token_purpose" NOT NULL,
	"user_id" uuid,
	"token_hash" "bytea" NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY NOT NULL,
	"email" text NOT NULL,
	"display_name" text collate "und-x-icu" NOT NULL,
	"password_hash" text,
	"medical_director" boolean DEFAULT false NOT NULL,
	"student" boolean DEFAULT false NOT NULL,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "charges" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"appointment_id" uuid,
	"price_item_id" uuid NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"status" charge_status DEFAULT 'open' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "charges_amount" CHECK ("charges"."amount_minor" > 0),
	CONSTRAINT "charges_currency" CHECK ("charges"."currency" ~ '^[A-Z]{3}$')
);
--> statement-breakpoint
CREATE TABLE "ledger_entries" (
	"id" uuid PRIMARY KEY NOT NULL,
	"journal_id" uuid NOT NULL,
	"posting_key" text NOT NULL,
	"account" "ledger_account" NOT NULL,
	"debit_minor" bigint DEFAULT 0 NOT NULL,
	"credit_minor" bigint DEFAULT 0 NOT NULL,
	"currency" text NOT NULL,
	"charge_id" uuid,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "ledger_entries_posting" UNIQUE("posting_key","account"),
	CONSTRAINT "ledger_entries_one_side" CHECK (("ledger_entries"."debit_minor" > 0 and "ledger_entries"."credit_minor" = 0) or ("ledger_entries"."credit_minor" > 0 and "ledger_entries"."debit_minor" = 0))
);
--> statement-breakpoint
CREATE TABLE "payment_events" (
	"id" text PRIMARY KEY NOT NULL,
	"type" text NOT NULL,
	"object_id" text,
	"payload" jsonb NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "payments" (
	"id" uuid PRIMARY KEY NOT NULL,
	"charge_id" uuid NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"status" "payment_status" DEFAULT 'preparing' NOT NULL,
	"service_session_id" text,
	"service_session_url" text,
	"service_payment_id" text,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "payments_serviceSessionId_unique" UNIQUE("service_session_id"),
	CONSTRAINT "payments_amount" CHECK ("payments"."amount_minor" > 0)
);
--> statement-breakpoint
CREATE TABLE "refunds" (
	"id" uuid PRIMARY KEY NOT NULL,
	"payment_id" uuid NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"status" "refund_status" DEFAULT 'pending' NOT NULL,
	"reason" text NOT NULL,
	"service_refund_id" text,
	"created_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "refunds_paymentId_unique" UNIQUE("payment_id"),
	CONSTRAINT "refunds_serviceRefundId_unique" UNIQUE("service_refund_id"),
	CONSTRAINT "refunds_amount" CHECK ("refunds"."amount_minor" > 0)
);
--> statement-breakpoint
CREATE TABLE "appointments" (
	"id" uuid PRIMARY KEY NOT NULL,
	"class_date_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"enrollment_id" uuid NOT NULL,
	"status" "appointment_status" DEFAULT 'booked' NOT NULL,
	"monitored" boolean NOT NULL,
	"exercised" boolean DEFAULT true NOT NULL,
	"local_date" date NOT NULL,
	"starts_at" timestamp with time zone NOT NULL,
	"ends_at" timestamp with time zone NOT NULL,
	"during" "tstzrange" GENERATED ALWAYS AS (tstzrange(starts_at, ends_at)) STORED NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	"arrived_at" timestamp with time zone,
	"checked_in_at" timestamp with time zone,
	"cancelled_at" timestamp with time zone,
	"cancelled_by" uuid,
	"cancelled_reason" text,
	CONSTRAINT "appointments_order" CHECK ("appointments"."ends_at" > "appointments"."starts_at")
);
--> statement-breakpoint
CREATE TABLE "body_measurements" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"height_cm" real,
	"weight_kg" real,
	"measured_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "body_measurements_height" CHECK ("body_measurements"."height_cm" between 100 and 250),
	CONSTRAINT "body_measurements_weight" CHECK ("body_measurements"."weight_kg" between 25 and 350)
);
--> statement-breakpoint
CREATE TABLE "cardiac_devices" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"icd_status" "icd_status" NOT NULL,
	"icd_zones" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"pacemaker" boolean DEFAULT false NOT NULL,
	"upper_tracking_rate" real,
	"checked_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "cardiac_devices_tracking" CHECK ("cardiac_devices"."upper_tracking_rate" between 50 and 220),
	CONSTRAINT "cardiac_devices_zones" CHECK ("cardiac_devices"."icd_status" = 'present' or jsonb_array_length("cardiac_devices"."icd_zones") = 0)
);
--> statement-breakpoint
CREATE TABLE "clinical_events" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"description" text NOT NULL,
	"occurred_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "conditions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"value" text NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "diagnoses" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"kind" "diagnosis_kind" NOT NULL,
	"description" text NOT NULL,
	"onset_on" date,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "exercise_tests" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"mode" "test_mode" NOT NULL,
	"protocol" text NOT NULL,
	"performed_on" date NOT NULL,
	"ended_by" "test_end" NOT NULL,
	"resting_heart_rate" real,
	"peak_heart_rate" real,
	"peak_vo2" real,
	"peak_mets" real,
	"vo2_source" "vo2_source",
	"note" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "exercise_tests_resting" CHECK ("exercise_tests"."resting_heart_rate" between 30 and 130),
	CONSTRAINT "exercise_tests_peak" CHECK ("exercise_tests"."peak_heart_rate" between 60 and 230),
	CONSTRAINT "exercise_tests_vo2" CHECK ("exercise_tests"."peak_vo2" between 4 and 80),
	CONSTRAINT "exercise_tests_mets" CHECK ("exercise_tests"."peak_mets" between 1 and 25)
);
--> statement-breakpoint
CREATE TABLE "medication_reviews" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "medications" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"name" text NOT NULL,
	"rate_acting" "rate_acting_class",
	"dose" text NOT NULL,
	"schedule" text NOT NULL,
	"started_on" date NOT NULL,
	"stopped_on" date,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "medications_order" CHECK ("medications"."stopped_on" >= "medications"."started_on")
);
--> statement-breakpoint
CREATE TABLE "resting_rates" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"seated" real NOT NULL,
	"standing" real,
	"measured_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "resting_rates_seated" CHECK ("resting_rates"."seated" between 30 and 130),
	CONSTRAINT "resting_rates_standing" CHECK ("resting_rates"."standing" between 30 and 160)
);
--> statement-breakpoint
CREATE TABLE "rhythm_records" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"rhythm" "rhythm" NOT NULL,
	"observed_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "risk_stratifications" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"level" "risk_level" NOT NULL,
	"assessed_on" date NOT NULL,
	"note" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid
);
--> statement-breakpoint
CREATE TABLE "thresholds" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"kind" "threshold_kind" NOT NULL,
	"heart_rate" real NOT NULL,
	"clear_mets" real,
	"exercise_test_id" uuid,
	"found_on" date NOT NULL,
	"note" text,
	"status" "threshold_status" DEFAULT 'active' NOT NULL,
	"ended_at" timestamp with time zone,
	"ended_by" uuid,
	"ended_reason" text,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "thresholds_rate" CHECK ("thresholds"."heart_rate" between 40 and 230),
	CONSTRAINT "thresholds_clear_mets" CHECK ("thresholds"."clear_mets" between 1 and 25),
	CONSTRAINT "thresholds_ended_by_someone" CHECK ("thresholds"."status" = 'active' or ("thresholds"."ended_at" is not null and "thresholds"."ended_by" is not null and "thresholds"."ended_reason" is not null))
);
--> statement-breakpoint
CREATE TABLE "walk_tests" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"distance_meters" real NOT NULL,
	"performed_on" date NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"entered_in_error_at" timestamp with time zone,
	"entered_in_error_by" uuid,
	CONSTRAINT "walk_tests_distance" CHECK ("walk_tests"."distance_meters" between 10 and 1200)
);
--> statement-breakpoint
CREATE TABLE "session_records" (
	"id" uuid PRIMARY KEY NOT NULL,
	"appointment_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"started_at" timestamp with time zone NOT NULL,
	"prescription_id" uuid,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	"signed_at" timestamp with time zone,
	"signed_by" uuid,
	"exercised" boolean,
	CONSTRAINT "session_records_appointment" UNIQUE("appointment_id"),
	CONSTRAINT "session_records_signature" CHECK (("session_records"."signed_at" is null) = ("session_records"."signed_by" is null))
);
--> statement-breakpoint
CREATE TABLE "vital_signs" (
	"id" uuid PRIMARY KEY NOT NULL,
	"session_record_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"phase" "vital_phase" NOT NULL,
	"measured_at" timestamp with time zone NOT NULL,
	"heart_rate" integer,
	"systolic" integer,
	"diastolic" integer,
	"oxygen_saturation" integer,
	"perceived_exertion" integer,
	"symptoms" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"note" text,
	"placement" "placement",
	"prescription_id" uuid,
	"status" "observation_status" DEFAULT 'final' NOT NULL,
	"amends" uuid,
	"amendment_reason" text,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	CONSTRAINT "vital_signs_heart_rate" CHECK ("vital_signs"."heart_rate" between 20 and 300),
	CONSTRAINT "vital_signs_systolic" CHECK ("vital_signs"."systolic" between 40 and 300),
	CONSTRAINT "vital_signs_diastolic" CHECK ("vital_signs"."diastolic" between 20 and 200 and "vital_signs"."diastolic" < "vital_signs"."systolic"),
	CONSTRAINT "vital_signs_oxygen" CHECK ("vital_signs"."oxygen_saturation" between 50 and 100),
	CONSTRAINT "vital_signs_exertion" CHECK ("vital_signs"."perceived_exertion" between 6 and 20),
	CONSTRAINT "vital_signs_amendment_reason" CHECK (("vital_signs"."amends" is null) = ("vital_signs"."amendment_reason" is null))
);
--> statement-breakpoint
CREATE TABLE "outbox" (
	"id" uuid PRIMARY KEY NOT NULL,
	"kind" text NOT NULL,
	"dedupe_key" text NOT NULL,
	"patient_id" uuid,
	"user_id" uuid,
	"subject" jsonb NOT NULL,
	"due_at" timestamp with time zone NOT NULL,
	"status" "outbox_status" DEFAULT 'pending' NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text,
	"sent_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "suppressions" (
	"address" text PRIMARY KEY NOT NULL,
	"reason" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "enrollments" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"site_id" uuid NOT NULL,
	"phase" integer DEFAULT 2 NOT NULL,
	"status" "enrollment_status" DEFAULT 'active' NOT NULL,
	"qualifying_diagnosis" "diagnosis_kind" NOT NULL,
	"qualifying_event_on" date NOT NULL,
	"payer" text NOT NULL,
	"enrolled_on" date NOT NULL,
	"closed_on" date,
	"closed_reason" text,
	"planned_sessions" integer DEFAULT 36 NOT NULL,
	"session_limit" integer DEFAULT 36 NOT NULL,
	"daily_limit" integer DEFAULT 2 NOT NULL,
	"monitored" boolean DEFAULT true NOT NULL,
	"booked" integer DEFAULT 0 NOT NULL,
	"attended" integer DEFAULT 0 NOT NULL,
	"attended_in_window" integer DEFAULT 0 NOT NULL,
	"first_session_on" date,
	"last_session_on" date,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "enrollments_planned" CHECK ("enrollments"."planned_sessions" between 1 and 72),
	CONSTRAINT "enrollments_limit" CHECK ("enrollments"."session_limit" between 1 and 72),
	CONSTRAINT "enrollments_daily_limit" CHECK ("enrollments"."daily_limit" between 1 and 2),
	CONSTRAINT "enrollments_course_limit" CHECK ("enrollments"."booked" between 0 and "enrollments"."session_limit"),
	CONSTRAINT "enrollments_attended" CHECK ("enrollments"."attended_in_window" between 0 and "enrollments"."attended")
);
--> statement-breakpoint
CREATE TABLE "patient_days" (
	"patient_id" uuid NOT NULL,
	"local_date" date NOT NULL,
	"booked" integer DEFAULT 0 NOT NULL,
	"daily_limit" integer NOT NULL,
	CONSTRAINT "patient_days_limit" CHECK ("patient_days"."booked" between 0 and "patient_days"."daily_limit")
);
--> statement-breakpoint
CREATE TABLE "patients" (
	"id" uuid PRIMARY KEY NOT NULL,
	"record_number" text NOT NULL,
	"family_name" text collate "und-x-icu" NOT NULL,
	"given_name" text collate "und-x-icu" NOT NULL,
	"birth_date" date NOT NULL,
	"sex_at_birth" "sex_at_birth" NOT NULL,
	"email" text,
	"phone" text,
	"time_zone" text,
	"site_id" uuid NOT NULL,
	"user_id" uuid,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "patients_recordNumber_unique" UNIQUE("record_number"),
	CONSTRAINT "patients_userId_unique" UNIQUE("user_id"),
	CONSTRAINT "patients_birth_date" CHECK ("patients"."birth_date" > '1900-01-01')
);
--> statement-breakpoint
CREATE TABLE "prescriptions" (
	"id" uuid PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"enrollment_id" uuid NOT NULL,
	"status" "prescription_status" DEFAULT 'draft' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"inputs" jsonb NOT NULL,
	"result" jsonb NOT NULL,
	"policy_version" integer NOT NULL,
	"engine_version" text NOT NULL,
	"supersedes" uuid,
	"awaiting" text,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid NOT NULL,
	"signed_at" timestamp with time zone,
	"signed_by" uuid,
	"physician_signed_at" timestamp with time zone,
	"physician_signed_by" uuid,
	"activated_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	CONSTRAINT "prescriptions_signature_whole" CHECK (("prescriptions"."signed_at" is null) = ("prescriptions"."signed_by" is null) and ("prescriptions"."physician_signed_at" is null) = ("prescriptions"."physician_signed_by" is null)),
	CONSTRAINT "prescriptions_active_is_signed" CHECK ("prescriptions"."status" <> 'active' or "prescriptions"."signed_at" is not null),
	CONSTRAINT "prescriptions_awaiting_physician" CHECK ("prescriptions"."awaiting" is null or "prescriptions"."status" = 'draft')
);
--> statement-breakpoint
CREATE TABLE "class_dates" (
	"id" uuid PRIMARY KEY NOT NULL,
	"template_id" uuid NOT NULL,
	"site_id" uuid NOT NULL,
	"local_date" date NOT NULL,
	"starts_at" timestamp with time zone NOT NULL,
	"ends_at" timestamp with time zone NOT NULL,
	"during" "tstzrange" GENERATED ALWAYS AS (tstzrange(starts_at, ends_at)) STORED NOT NULL,
	"capacity" integer NOT NULL,
	"booked" integer DEFAULT 0 NOT NULL,
	"monitored_capacity" integer NOT NULL,
	"monitored_booked" integer DEFAULT 0 NOT NULL,
	"status" "class_date_status" DEFAULT 'scheduled' NOT NULL,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "class_dates_template_date" UNIQUE("template_id","local_date"),
	CONSTRAINT "class_dates_order" CHECK ("class_dates"."ends_at" > "class_dates"."starts_at"),
	CONSTRAINT "class_dates_places" CHECK ("class_dates"."booked" between 0 and "class_dates"."capacity"),
	CONSTRAINT "class_dates_monitors" CHECK ("class_dates"."monitored_booked" between 0 and "class_dates"."monitored_capacity")
);
--> statement-breakpoint
CREATE TABLE "class_templates" (
	"id" uuid PRIMARY KEY NOT NULL,
	"site_id" uuid NOT NULL,
	"name" text NOT NULL,
	"kind" "class_kind" DEFAULT 'exercise' NOT NULL,
	"recurrence" text NOT NULL,
	"starts_on" date NOT NULL,
	"ends_on" date,
	"local_start" time NOT NULL,
	"duration_minutes" integer NOT NULL,
	"capacity" integer NOT NULL,
	"monitored_places" integer NOT NULL,
	"price_item_id" uuid,
	"version" integer DEFAULT 1 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "class_templates_duration" CHECK ("class_templates"."duration_minutes" between 10 and 240),
	CONSTRAINT "class_templates_capacity" CHECK ("class_templates"."capacity" between 1 and 60),
	CONSTRAINT "class_templates_monitored" CHECK ("class_templates"."monitored_places" between 0 and "class_templates"."capacity")
);
--> statement-breakpoint
CREATE TABLE "closures" (
	"id" uuid PRIMARY KEY NOT NULL,
	"site_id" uuid NOT NULL,
	"local_date" date NOT NULL,
	"reason" text NOT NULL,
	CONSTRAINT "closures_site_date" UNIQUE("site_id","local_date")
);
--> statement-breakpoint
CREATE TABLE "policies" (
	"version" integer PRIMARY KEY NOT NULL,
	"content" jsonb NOT NULL,
	"effective_from" timestamp with time zone DEFAULT now() NOT NULL,
	"created_by" uuid,
	"note" text NOT NULL,
	CONSTRAINT "policies_version" CHECK ("policies"."version" >= 1)
);
--> statement-breakpoint
CREATE TABLE "price_items" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"amount_minor" bigint NOT NULL,
	"currency" text NOT NULL,
	"active" boolean DEFAULT true NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "price_items_amount" CHECK ("price_items"."amount_minor" > 0),
	CONSTRAINT "price_items_currency" CHECK ("price_items"."currency" ~ '^[A-Z]{3}$')
);
--> statement-breakpoint
CREATE TABLE "sites" (
	"id" uuid PRIMARY KEY NOT NULL,
	"name" text NOT NULL,
	"time_zone" text NOT NULL,
	"address" text NOT NULL,
	"phone" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sites_name_unique" UNIQUE("name")
);
--> statement-breakpoint
ALTER TABLE "idempotency_keys" ADD CONSTRAINT "idempotency_keys_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "user_roles" ADD CONSTRAINT "user_roles_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "user_roles" ADD CONSTRAINT "user_roles_granted_by_users_id_fk" FOREIGN KEY ("granted_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "user_sites" ADD CONSTRAINT "user_sites_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "user_sites" ADD CONSTRAINT "user_sites_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "user_tokens" ADD CONSTRAINT "user_tokens_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "charges" ADD CONSTRAINT "charges_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "charges" ADD CONSTRAINT "charges_appointment_id_appointments_id_fk" FOREIGN KEY ("appointment_id") REFERENCES "public"."appointments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "charges" ADD CONSTRAINT "charges_price_item_id_price_items_id_fk" FOREIGN KEY ("price_item_id") REFERENCES "public"."price_items"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "ledger_entries" ADD CONSTRAINT "ledger_entries_charge_id_charges_id_fk" FOREIGN KEY ("charge_id") REFERENCES "public"."charges"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_charge_id_charges_id_fk" FOREIGN KEY ("charge_id") REFERENCES "public"."charges"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refunds" ADD CONSTRAINT "refunds_payment_id_payments_id_fk" FOREIGN KEY ("payment_id") REFERENCES "public"."payments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refunds" ADD CONSTRAINT "refunds_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "appointments" ADD CONSTRAINT "appointments_class_date_id_class_dates_id_fk" FOREIGN KEY ("class_date_id") REFERENCES "public"."class_dates"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "appointments" ADD CONSTRAINT "appointments_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "appointments" ADD CONSTRAINT "appointments_enrollment_id_enrollments_id_fk" FOREIGN KEY ("enrollment_id") REFERENCES "public"."enrollments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "appointments" ADD CONSTRAINT "appointments_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "appointments" ADD CONSTRAINT "appointments_cancelled_by_users_id_fk" FOREIGN KEY ("cancelled_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "body_measurements" ADD CONSTRAINT "body_measurements_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "body_measurements" ADD CONSTRAINT "body_measurements_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "body_measurements" ADD CONSTRAINT "body_measurements_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cardiac_devices" ADD CONSTRAINT "cardiac_devices_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "clinical_events" ADD CONSTRAINT "clinical_events_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "clinical_events" ADD CONSTRAINT "clinical_events_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "clinical_events" ADD CONSTRAINT "clinical_events_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "conditions" ADD CONSTRAINT "conditions_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "conditions" ADD CONSTRAINT "conditions_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "conditions" ADD CONSTRAINT "conditions_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "diagnoses" ADD CONSTRAINT "diagnoses_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "diagnoses" ADD CONSTRAINT "diagnoses_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "diagnoses" ADD CONSTRAINT "diagnoses_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_tests" ADD CONSTRAINT "exercise_tests_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medication_reviews" ADD CONSTRAINT "medication_reviews_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medication_reviews" ADD CONSTRAINT "medication_reviews_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medication_reviews" ADD CONSTRAINT "medication_reviews_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_rates" ADD CONSTRAINT "resting_rates_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_rates" ADD CONSTRAINT "resting_rates_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "resting_rates" ADD CONSTRAINT "resting_rates_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rhythm_records" ADD CONSTRAINT "rhythm_records_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rhythm_records" ADD CONSTRAINT "rhythm_records_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "rhythm_records" ADD CONSTRAINT "rhythm_records_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "risk_stratifications" ADD CONSTRAINT "risk_stratifications_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_exercise_test_id_exercise_tests_id_fk" FOREIGN KEY ("exercise_test_id") REFERENCES "public"."exercise_tests"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_ended_by_users_id_fk" FOREIGN KEY ("ended_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "thresholds" ADD CONSTRAINT "thresholds_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_tests" ADD CONSTRAINT "walk_tests_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_tests" ADD CONSTRAINT "walk_tests_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "walk_tests" ADD CONSTRAINT "walk_tests_entered_in_error_by_users_id_fk" FOREIGN KEY ("entered_in_error_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session_records" ADD CONSTRAINT "session_records_appointment_id_appointments_id_fk" FOREIGN KEY ("appointment_id") REFERENCES "public"."appointments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session_records" ADD CONSTRAINT "session_records_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session_records" ADD CONSTRAINT "session_records_prescription_id_prescriptions_id_fk" FOREIGN KEY ("prescription_id") REFERENCES "public"."prescriptions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session_records" ADD CONSTRAINT "session_records_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "session_records" ADD CONSTRAINT "session_records_signed_by_users_id_fk" FOREIGN KEY ("signed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vital_signs" ADD CONSTRAINT "vital_signs_session_record_id_session_records_id_fk" FOREIGN KEY ("session_record_id") REFERENCES "public"."session_records"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vital_signs" ADD CONSTRAINT "vital_signs_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vital_signs" ADD CONSTRAINT "vital_signs_prescription_id_prescriptions_id_fk" FOREIGN KEY ("prescription_id") REFERENCES "public"."prescriptions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vital_signs" ADD CONSTRAINT "vital_signs_amends_vital_signs_id_fk" FOREIGN KEY ("amends") REFERENCES "public"."vital_signs"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "vital_signs" ADD CONSTRAINT "vital_signs_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox" ADD CONSTRAINT "outbox_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "enrollments" ADD CONSTRAINT "enrollments_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "enrollments" ADD CONSTRAINT "enrollments_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patient_days" ADD CONSTRAINT "patient_days_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patients" ADD CONSTRAINT "patients_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "patients" ADD CONSTRAINT "patients_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_enrollment_id_enrollments_id_fk" FOREIGN KEY ("enrollment_id") REFERENCES "public"."enrollments"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_policy_version_policies_version_fk" FOREIGN KEY ("policy_version") REFERENCES "public"."policies"("version") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_supersedes_prescriptions_id_fk" FOREIGN KEY ("supersedes") REFERENCES "public"."prescriptions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_signed_by_users_id_fk" FOREIGN KEY ("signed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prescriptions" ADD CONSTRAINT "prescriptions_physician_signed_by_users_id_fk" FOREIGN KEY ("physician_signed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_dates" ADD CONSTRAINT "class_dates_template_id_class_templates_id_fk" FOREIGN KEY ("template_id") REFERENCES "public"."class_templates"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_dates" ADD CONSTRAINT "class_dates_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_templates" ADD CONSTRAINT "class_templates_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "class_templates" ADD CONSTRAINT "class_templates_price_item_id_price_items_id_fk" FOREIGN KEY ("price_item_id") REFERENCES "public"."price_items"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "closures" ADD CONSTRAINT "closures_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "audit_events_sequence" ON "audit_events" USING btree ("sequence");--> statement-breakpoint
CREATE INDEX "audit_events_patient" ON "audit_events" USING btree ("patient_id","at");--> statement-breakpoint
CREATE INDEX "audit_events_actor" ON "audit_events" USING btree ("actor_id","at");--> statement-breakpoint
CREATE UNIQUE INDEX "audit_seals_from" ON "audit_seals" USING btree ("from_sequence");--> statement-breakpoint
CREATE INDEX "idempotency_keys_created" ON "idempotency_keys" USING btree ("created_at");--> statement-breakpoint
CREATE INDEX "sessions_expire" ON "sessions" USING btree ("expire");--> statement-breakpoint
CREATE INDEX "sessions_user" ON "sessions" USING btree ("user_id");--> statement-breakpoint
CREATE UNIQUE INDEX "user_tokens_hash_unique" ON "user_tokens" USING btree ("token_hash");--> statement-breakpoint
CREATE INDEX "user_tokens_user" ON "user_tokens" USING btree ("user_id","purpose");--> statement-breakpoint
CREATE UNIQUE INDEX "users_email_unique" ON "users" USING btree (lower("email"));--> statement-breakpoint
CREATE UNIQUE INDEX "charges_appointment_live" ON "charges" USING btree ("appointment_id") WHERE status <> 'void';--> statement-breakpoint
CREATE INDEX "charges_patient" ON "charges" USING btree ("patient_id","created_at");--> statement-breakpoint
CREATE INDEX "ledger_entries_journal" ON "ledger_entries" USING btree ("journal_id");--> statement-breakpoint
CREATE INDEX "ledger_entries_charge" ON "ledger_entries" USING btree ("charge_id");--> statement-breakpoint
CREATE UNIQUE INDEX "payments_one_live_attempt" ON "payments" USING btree ("charge_id") WHERE status in ('preparing', 'pending');--> statement-breakpoint
CREATE UNIQUE INDEX "payments_one_settled" ON "payments" USING btree ("charge_id") WHERE status = 'settled';--> statement-breakpoint
CREATE UNIQUE INDEX "appointments_once" ON "appointments" USING btree ("class_date_id","patient_id") WHERE status in ('booked', 'arrived', 'checked-in', 'fulfilled', 'noshow');--> statement-breakpoint
CREATE INDEX "appointments_class_date" ON "appointments" USING btree ("class_date_id");--> statement-breakpoint
CREATE INDEX "appointments_patient" ON "appointments" USING btree ("patient_id","starts_at");--> statement-breakpoint
CREATE INDEX "appointments_enrollment_attended" ON "appointments" USING btree ("enrollment_id","local_date") WHERE status = 'fulfilled';--> statement-breakpoint
CREATE INDEX "body_measurements_patient" ON "body_measurements" USING btree ("patient_id","measured_on");--> statement-breakpoint
CREATE INDEX "cardiac_devices_patient" ON "cardiac_devices" USING btree ("patient_id","checked_on");--> statement-breakpoint
CREATE INDEX "clinical_events_patient" ON "clinical_events" USING btree ("patient_id","occurred_on");--> statement-breakpoint
CREATE INDEX "conditions_patient" ON "conditions" USING btree ("patient_id","kind","recorded_at");--> statement-breakpoint
CREATE INDEX "diagnoses_patient" ON "diagnoses" USING btree ("patient_id");--> statement-breakpoint
CREATE INDEX "exercise_tests_patient" ON "exercise_tests" USING btree ("patient_id","performed_on");--> statement-breakpoint
CREATE INDEX "medication_reviews_patient" ON "medication_reviews" USING btree ("patient_id","recorded_at");--> statement-breakpoint
CREATE INDEX "medications_patient" ON "medications" USING btree ("patient_id","started_on");--> statement-breakpoint
CREATE INDEX "resting_rates_patient" ON "resting_rates" USING btree ("patient_id","measured_on");--> statement-breakpoint
CREATE INDEX "rhythm_records_patient" ON "rhythm_records" USING btree ("patient_id","observed_on");--> statement-breakpoint
CREATE INDEX "risk_stratifications_patient" ON "risk_stratifications" USING btree ("patient_id","assessed_on");--> statement-breakpoint
CREATE INDEX "thresholds_patient" ON "thresholds" USING btree ("patient_id","status");--> statement-breakpoint
CREATE INDEX "walk_tests_patient" ON "walk_tests" USING btree ("patient_id","performed_on");--> statement-breakpoint
CREATE INDEX "session_records_patient" ON "session_records" USING btree ("patient_id","started_at");--> statement-breakpoint
CREATE INDEX "vital_signs_record" ON "vital_signs" USING btree ("session_record_id","measured_at");--> statement-breakpoint
CREATE INDEX "vital_signs_patient" ON "vital_signs" USING btree ("patient_id","measured_at");--> statement-breakpoint
CREATE UNIQUE INDEX "vital_signs_amends_once" ON "vital_signs" USING btree ("amends") WHERE amends is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "outbox_dedupe_unique" ON "outbox" USING btree ("dedupe_key");--> statement-breakpoint
CREATE INDEX "outbox_due" ON "outbox" USING btree ("status","due_at");--> statement-breakpoint
CREATE UNIQUE INDEX "enrollments_one_active" ON "enrollments" USING btree ("patient_id","phase") WHERE status in ('active', 'on-hold');--> statement-breakpoint
CREATE INDEX "enrollments_patient" ON "enrollments" USING btree ("patient_id");--> statement-breakpoint
CREATE INDEX "enrollments_first_session" ON "enrollments" USING btree ("first_session_on","site_id");--> statement-breakpoint
CREATE UNIQUE INDEX "patient_days_unique" ON "patient_days" USING btree ("patient_id","local_date");--> statement-breakpoint
CREATE INDEX "patients_name" ON "patients" USING btree ("family_name","given_name","id");--> statement-breakpoint
CREATE INDEX "patients_site_name" ON "patients" USING btree ("site_id","family_name","given_name","id");--> statement-breakpoint
CREATE INDEX "patients_family_prefix" ON "patients" USING btree (lower("family_name") text_pattern_ops);--> statement-breakpoint
CREATE INDEX "patients_given_prefix" ON "patients" USING btree (lower("given_name") text_pattern_ops);--> statement-breakpoint
CREATE INDEX "prescriptions_patient" ON "prescriptions" USING btree ("patient_id","created_at");--> statement-breakpoint
CREATE INDEX "prescriptions_awaiting" ON "prescriptions" USING btree ("awaiting") WHERE awaiting is not null;--> statement-breakpoint
CREATE UNIQUE INDEX "prescriptions_one_active" ON "prescriptions" USING btree ("patient_id") WHERE status = 'active';--> statement-breakpoint
CREATE INDEX "class_dates_site_starts" ON "class_dates" USING btree ("site_id","starts_at");--> statement-breakpoint
CREATE INDEX "class_dates_starts" ON "class_dates" USING btree ("starts_at");--> statement-breakpoint
CREATE INDEX "class_templates_site" ON "class_templates" USING btree ("site_id");