CREATE TABLE "mails" (
	"id" uuid PRIMARY KEY NOT NULL,
	"key" text NOT NULL,
	"kind" text NOT NULL,
	"to" text NOT NULL,
	"subject" text NOT NULL,
	"text" text NOT NULL,
	"html" text NOT NULL,
	"outage_id" uuid,
	"person_id" uuid,
	"created_at" timestamp with time zone NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"next_try_at" timestamp with time zone NOT NULL,
	"sent_at" timestamp with time zone,
	"failed_at" timestamp with time zone,
	"last_error" text,
	CONSTRAINT "mails_one_end" CHECK ("mails"."sent_at" is null or "mails"."failed_at" is null)
);
--> statement-breakpoint
ALTER TABLE "mails" ADD CONSTRAINT "mails_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "mails" ADD CONSTRAINT "mails_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "mails_key" ON "mails" USING btree ("key");--> statement-breakpoint
CREATE INDEX "mails_due" ON "mails" USING btree ("next_try_at","id") WHERE "mails"."sent_at" is null and "mails"."failed_at" is null;--> statement-breakpoint
CREATE INDEX "mails_failed" ON "mails" USING btree ("id") WHERE "mails"."failed_at" is not null;--> statement-breakpoint
CREATE INDEX "mails_outage" ON "mails" USING btree ("outage_id");--> statement-breakpoint
CREATE INDEX "mails_person" ON "mails" USING btree ("person_id");