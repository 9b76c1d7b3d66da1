CREATE TABLE "message_preferences" (
	"patient_id" uuid PRIMARY KEY NOT NULL,
	"reminders" boolean NOT NULL,
	"changed_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "unsubscribe_links" (
	"token_hash" "bytea" PRIMARY KEY NOT NULL,
	"patient_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "message_preferences" ADD CONSTRAINT "message_preferences_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "unsubscribe_links" ADD CONSTRAINT "unsubscribe_links_patient_id_patients_id_fk" FOREIGN KEY ("patient_id") REFERENCES "public"."patients"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "unsubscribe_links_age" ON "unsubscribe_links" USING btree ("created_at");