CREATE TABLE "exports" (
	"id" uuid PRIMARY KEY NOT NULL,
	"person_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"state" text NOT NULL,
	"file_name" text NOT NULL,
	"outage_ids" uuid[] NOT NULL,
	"total" integer NOT NULL,
	"done" integer DEFAULT 0 NOT NULL,
	"tries" integer DEFAULT 0 NOT NULL,
	"heartbeat_at" timestamp with time zone,
	"parts" integer,
	"bytes" bigint,
	"fault" text,
	"asked_at" timestamp with time zone NOT NULL,
	"done_at" timestamp with time zone,
	"expires_at" timestamp with time zone,
	CONSTRAINT "exports_done" CHECK ("exports"."done" between 0 and "exports"."total"),
	CONSTRAINT "exports_file" CHECK ("exports"."state" <> 'done' or ("exports"."parts" is not null and "exports"."bytes" is not null and "exports"."expires_at" is not null))
);
--> statement-breakpoint
CREATE TABLE "outage_facts" (
	"outage_id" uuid PRIMARY KEY NOT NULL,
	"version" integer NOT NULL,
	"facts" jsonb NOT NULL
);
--> statement-breakpoint
ALTER TABLE "exports" ADD CONSTRAINT "exports_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage_facts" ADD CONSTRAINT "outage_facts_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "exports_person" ON "exports" USING btree ("person_id","id");--> statement-breakpoint
CREATE INDEX "exports_state" ON "exports" USING btree ("state","id");