ALTER TABLE "mails" ADD COLUMN "notice" jsonb;--> statement-breakpoint
ALTER TABLE "mails" ADD COLUMN "entered_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "people" ADD COLUMN "invited_at" timestamp with time zone;--> statement-breakpoint
CREATE INDEX "mails_to_enter" ON "mails" USING btree ("id") WHERE "mails"."notice" is not null and "mails"."sent_at" is not null and "mails"."entered_at" is null;