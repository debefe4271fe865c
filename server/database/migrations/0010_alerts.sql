CREATE TABLE "alert_told" (
	"outage_id" uuid NOT NULL,
	"key" text NOT NULL,
	"person_id" uuid NOT NULL,
	"told_at" timestamp (3) with time zone NOT NULL,
	"mailed_at" timestamp (3) with time zone,
	CONSTRAINT "alert_told_outage_id_key_person_id_pk" PRIMARY KEY("outage_id","key","person_id")
);
--> statement-breakpoint
CREATE TABLE "alerts" (
	"outage_id" uuid NOT NULL,
	"key" text NOT NULL,
	"alert" text NOT NULL,
	"level" integer NOT NULL,
	"words" text NOT NULL,
	"to_names" text[] NOT NULL,
	"raised_at" timestamp (3) with time zone NOT NULL,
	"acknowledged_name" text,
	"acknowledged_at" timestamp (3) with time zone,
	"over_at" timestamp (3) with time zone,
	CONSTRAINT "alerts_outage_id_key_pk" PRIMARY KEY("outage_id","key")
);
--> statement-breakpoint
ALTER TABLE "sites" ADD COLUMN "alert_rules" jsonb DEFAULT '{"levels":[{"answerable":true,"supervisors":false,"people":[]},{"answerable":false,"supervisors":true,"people":[]},{"answerable":false,"supervisors":false,"people":[]}],"passOnAfter":[5,10]}'::jsonb NOT NULL;--> statement-breakpoint
ALTER TABLE "alert_told" ADD CONSTRAINT "alert_told_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alert_told" ADD CONSTRAINT "alert_told_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "alerts" ADD CONSTRAINT "alerts_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "alert_told_waiting" ON "alert_told" USING btree ("outage_id") WHERE "alert_told"."mailed_at" is null;--> statement-breakpoint
CREATE INDEX "alert_told_mailed" ON "alert_told" USING btree ("outage_id","mailed_at");--> statement-breakpoint
CREATE INDEX "alert_told_person" ON "alert_told" USING btree ("person_id");--> statement-breakpoint
CREATE INDEX "alerts_open" ON "alerts" USING btree ("outage_id") WHERE "alerts"."over_at" is null;