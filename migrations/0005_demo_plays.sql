CREATE TABLE "demo_plays" (
	"id" uuid PRIMARY KEY NOT NULL,
	"story" text NOT NULL,
	"first_day" date NOT NULL,
	"played_to" timestamp with time zone NOT NULL,
	"played_at" timestamp with time zone DEFAULT now() NOT NULL
);
