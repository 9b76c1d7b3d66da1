CREATE TABLE "exercise_bouts" (
	"id" uuid PRIMARY KEY NOT NULL,
	"session_record_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"setting" jsonb NOT NULL,
	"minutes" integer,
	"short_bouts" boolean DEFAULT false NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	CONSTRAINT "exercise_bouts_minutes" CHECK ("exercise_bouts"."minutes" between 1 and 180)
);
--> statement-breakpoint
CREATE TABLE "missed_doses" (
	"patient_id" uuid NOT NULL,
	"local_date" date NOT NULL,
	"missed" boolean NOT NULL,
	"recorded_at" timestamp with time zone DEFAULT now() NOT NULL,
	"recorded_by" uuid NOT NULL,
	CONSTRAINT "missed_doses_day" PRIMARY KEY("patient_id","local_date")
);
--> statement-breakpoint
CREATE TABLE "progression_proposals" (
	"id" uuid PRIMARY KEY NOT NULL,
	"session_record_id" uuid NOT NULL,
	"patient_id" uuid NOT NULL,
	"prescription_id" uuid NOT NULL,
	"proposal" jsonb NOT NULL,
	"policy_version" integer NOT NULL,
	"engine_version" text NOT NULL,
	"made_at" timestamp with time zone DEFAULT now() NOT NULL,
	"decision" text,
	"decided_load" jsonb,
	"decision_reason" text,
	"decided_at" timestamp with time zone,
	"decided_by" uuid,
	CONSTRAINT "progression_proposals_record" UNIQUE("session_record_id"),
	CONSTRAINT "progression_proposals_decision" CHECK (("progression_proposals"."decision" is null and "progression_proposals"."decided_at" is null and "progression_proposals"."decided_by" is null and "progression_proposals"."decided_load" is null)
        or ("progression_proposals"."decision" in ('accepted', 'edited', 'dismissed') and "progression_proposals"."decided_at" is not null and "progression_proposals"."decided_by" is not null)),
	CONSTRAINT "progression_proposals_reason" CHECK ("progression_proposals"."decision" is distinct from 'dismissed' or "progression_proposals"."decision_reason" is not null)
);
--> statement-breakpoint
ALTER TABLE "exercise_bouts" ADD CONSTRAINT "exercise_bouts_session_record_id_session_records_id_fk" FOREIGN KEY ("session_record_id") REFERENCES "public"."session_records"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_bouts" ADD CONSTRAINT "exercise_bouts_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exercise_bouts" ADD CONSTRAINT "exercise_bouts_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "missed_doses" ADD CONSTRAINT "missed_doses_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "missed_doses" ADD CONSTRAINT "missed_doses_recorded_by_users_id_fk" FOREIGN KEY ("recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "progression_proposals" ADD CONSTRAINT "progression_proposals_session_record_id_session_records_id_fk" FOREIGN KEY ("session_record_id") REFERENCES "public"."session_records"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "progression_proposals" ADD CONSTRAINT "progression_proposals_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "progression_proposals" ADD CONSTRAINT "progression_proposals_prescription_id_prescriptions_id_fk" FOREIGN KEY ("prescription_id") REFERENCES "public"."prescriptions"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "progression_proposals" ADD CONSTRAINT "progression_proposals_policy_version_policies_version_fk" FOREIGN KEY ("policy_version") REFERENCES "public"."policies"("version") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "progression_proposals" ADD CONSTRAINT "progression_proposals_decided_by_users_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "exercise_bouts_record" ON "exercise_bouts" USING btree ("session_record_id","received_at");--> statement-breakpoint
CREATE INDEX "progression_proposals_patient" ON "progression_proposals" USING btree ("patient_id","made_at");--> statement-breakpoint
CREATE INDEX "progression_proposals_open" ON "progression_proposals" USING btree ("made_at") WHERE decision is null;