CREATE TABLE "changes" (
	"id" uuid PRIMARY KEY NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"person_id" uuid NOT NULL,
	"person_name" text NOT NULL,
	"site_id" uuid,
	"subject" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"subject_name" text NOT NULL,
	"deed" text NOT NULL,
	"fields" jsonb NOT NULL
);
--> statement-breakpoint
ALTER TABLE "sites" ADD COLUMN "holding" jsonb DEFAULT '{"addAccuracy":false,"allowsMinus12":false,"classes":[]}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "sites" ADD COLUMN "instrument_check_days" integer DEFAULT 90 NOT NULL;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "changes" ADD CONSTRAINT "changes_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "changes_site" ON "changes" USING btree ("site_id","id");--> statement-breakpoint
CREATE INDEX "changes_subject" ON "changes" USING btree ("subject","subject_id","id");--> statement-breakpoint
CREATE INDEX "changes_person" ON "changes" USING btree ("person_id");--> statement-breakpoint
ALTER TABLE "sites" ADD CONSTRAINT "sites_instrument_check" CHECK ("sites"."instrument_check_days" > 0);--> statement-breakpoint
-- History is append-only, as the log is.
CREATE FUNCTION refuse_history_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'the history of changes is append-only' USING ERRCODE = 'restrict_violation';
END
$$;
--> statement-breakpoint
CREATE TRIGGER changes_append_only BEFORE UPDATE OR DELETE ON "changes" FOR EACH ROW EXECUTE FUNCTION refuse_history_change();
--> statement-breakpoint
CREATE TRIGGER changes_no_truncate BEFORE TRUNCATE ON "changes" FOR EACH STATEMENT EXECUTE FUNCTION refuse_history_change();
