ALTER TABLE "exercise_tests" ALTER COLUMN "peak_heart_rate" SET NOT NULL;--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "stop_recorded_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "medications" ADD COLUMN "stop_recorded_by" uuid;--> statement-breakpoint
ALTER TABLE "medications" ADD CONSTRAINT "medications_stop_recorded_by_users_id_fk" FOREIGN KEY ("stop_recorded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;