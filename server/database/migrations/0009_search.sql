CREATE TABLE "outage_search" (
	"outage_id" uuid PRIMARY KEY NOT NULL,
	"version" integer NOT NULL,
	"code" text NOT NULL,
	"site_id" uuid NOT NULL,
	"controller_id" uuid NOT NULL,
	"work_kind" text NOT NULL,
	"phase" text NOT NULL,
	"opened_at" timestamp (3) with time zone NOT NULL,
	"opened_on" date NOT NULL,
	"ended_at" timestamp (3) with time zone,
	"dark_since" timestamp (3) with time zone,
	"dark_seconds" integer NOT NULL,
	"hold_seconds" integer NOT NULL,
	"late_readings" integer NOT NULL,
	"outcomes" text[] NOT NULL,
	"people" uuid[] NOT NULL,
	"tags" text[] NOT NULL,
	"words" "tsvector" NOT NULL
);
--> statement-breakpoint
ALTER TABLE "outage_search" ADD CONSTRAINT "outage_search_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage_search" ADD CONSTRAINT "outage_search_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outage_search" ADD CONSTRAINT "outage_search_controller_id_controllers_id_fk" FOREIGN KEY ("controller_id") REFERENCES "public"."controllers"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "outage_search_site_opened" ON "outage_search" USING btree ("site_id","opened_at","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_site_dark" ON "outage_search" USING btree ("site_id","dark_seconds","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_site_hold" ON "outage_search" USING btree ("site_id","hold_seconds","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_opened" ON "outage_search" USING btree ("opened_at","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_dark" ON "outage_search" USING btree ("dark_seconds","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_hold" ON "outage_search" USING btree ("hold_seconds","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_terms" ON "outage_search" USING gin ("words","tags","people","outcomes") WITH (fastupdate=true,gin_pending_list_limit=128);