CREATE TABLE "deletions" (
	"outage_id" uuid PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"site_id" uuid NOT NULL,
	"controller_name" text NOT NULL,
	"work_kind" text NOT NULL,
	"planned" boolean NOT NULL,
	"opened_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone,
	"size" integer NOT NULL,
	"root" text NOT NULL,
	"statement" text NOT NULL,
	"signature" text NOT NULL,
	"person_id" uuid NOT NULL,
	"device_id" uuid NOT NULL,
	"checkpoint" jsonb,
	"deleted_at" timestamp (3) with time zone NOT NULL,
	"transaction" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "file_removals" (
	"sha256" text PRIMARY KEY NOT NULL,
	"outage_id" uuid NOT NULL,
	"asked_at" timestamp with time zone NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"failure" text
);
--> statement-breakpoint
CREATE TABLE "legal_holds" (
	"id" uuid PRIMARY KEY NOT NULL,
	"outage_id" uuid NOT NULL,
	"person_id" uuid NOT NULL,
	"person_name" text NOT NULL,
	"at" timestamp with time zone NOT NULL,
	"reason" text NOT NULL,
	"lifted_by_id" uuid,
	"lifted_by_name" text,
	"lifted_at" timestamp with time zone,
	"lifted_reason" text
);
--> statement-breakpoint
CREATE TABLE "retention" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"site_id" uuid,
	"years" integer NOT NULL,
	CONSTRAINT "retention_site" UNIQUE NULLS NOT DISTINCT("site_id"),
	CONSTRAINT "retention_years" CHECK ("retention"."years" between 1 and 30)
);
--> statement-breakpoint
ALTER TABLE "case_lessons" DROP CONSTRAINT "case_lessons_outage_id_outages_id_fk";
--> statement-breakpoint
ALTER TABLE "step_lessons" DROP CONSTRAINT "step_lessons_outage_id_outages_id_fk";
--> statement-breakpoint
ALTER TABLE "deletions" ADD CONSTRAINT "deletions_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deletions" ADD CONSTRAINT "deletions_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "deletions" ADD CONSTRAINT "deletions_device_id_devices_id_fk" FOREIGN KEY ("device_id") REFERENCES "public"."devices"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "legal_holds" ADD CONSTRAINT "legal_holds_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "legal_holds" ADD CONSTRAINT "legal_holds_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "legal_holds" ADD CONSTRAINT "legal_holds_lifted_by_id_people_id_fk" FOREIGN KEY ("lifted_by_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "retention" ADD CONSTRAINT "retention_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "deletions_deleted" ON "deletions" USING btree ("deleted_at","outage_id");--> statement-breakpoint
CREATE INDEX "deletions_site" ON "deletions" USING btree ("site_id","deleted_at");--> statement-breakpoint
CREATE UNIQUE INDEX "legal_holds_one" ON "legal_holds" USING btree ("outage_id") WHERE "legal_holds"."lifted_at" is null;--> statement-breakpoint
CREATE INDEX "legal_holds_outage" ON "legal_holds" USING btree ("outage_id","id");--> statement-breakpoint
CREATE INDEX "outages_ended" ON "outages" USING btree ("ended_at","id") WHERE "outages"."ended_at" is not null;