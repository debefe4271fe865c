CREATE TABLE "entries" (
	"outage_id" uuid NOT NULL,
	"seq" integer NOT NULL,
	"id" uuid NOT NULL,
	"kind" text NOT NULL,
	"person_id" uuid,
	"device_id" uuid NOT NULL,
	"n" integer NOT NULL,
	"hash" text NOT NULL,
	"signed" text NOT NULL,
	"signature" text NOT NULL,
	"received_at" timestamp (3) with time zone NOT NULL,
	"standing" text NOT NULL,
	"why" jsonb DEFAULT '[]'::jsonb NOT NULL,
	CONSTRAINT "entries_outage_id_seq_pk" PRIMARY KEY("outage_id","seq"),
	CONSTRAINT "entries_seq" CHECK ("entries"."seq" > 0)
);
--> statement-breakpoint
CREATE TABLE "files" (
	"outage_id" uuid NOT NULL,
	"sha256" text NOT NULL,
	"mime" text NOT NULL,
	"size" integer NOT NULL,
	"person_id" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "files_outage_id_sha256_pk" PRIMARY KEY("outage_id","sha256")
);
--> statement-breakpoint
CREATE TABLE "outages" (
	"id" uuid PRIMARY KEY NOT NULL,
	"code" text NOT NULL,
	"site_id" uuid NOT NULL,
	"controller_id" uuid NOT NULL,
	"planned" boolean NOT NULL,
	"work_kind" text NOT NULL,
	"phase" text NOT NULL,
	"size" integer DEFAULT 0 NOT NULL,
	"state" jsonb NOT NULL,
	"fold_version" integer NOT NULL,
	"points_in_hand" integer DEFAULT 0 NOT NULL,
	"starts_at" timestamp with time zone,
	"dark_at" timestamp with time zone,
	"ended_at" timestamp with time zone,
	"opened_at" timestamp with time zone NOT NULL,
	"updated_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "refusals" (
	"outage_id" uuid NOT NULL,
	"device_id" uuid NOT NULL,
	"n" integer NOT NULL,
	"id" uuid NOT NULL,
	"hash" text NOT NULL,
	"reason" text NOT NULL,
	"seq" integer NOT NULL,
	CONSTRAINT "refusals_outage_id_device_id_n_pk" PRIMARY KEY("outage_id","device_id","n")
);
--> statement-breakpoint
CREATE TABLE "devices" (
	"id" uuid PRIMARY KEY NOT NULL,
	"person_id" uuid,
	"name" text NOT NULL,
	"public_key" text NOT NULL,
	"enrolled_at" timestamp with time zone NOT NULL,
	"revoked_at" timestamp with time zone,
	"last_seen_at" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "people" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"role" text NOT NULL,
	"password_hash" text NOT NULL,
	"session_version" integer DEFAULT 1 NOT NULL,
	"must_change_password" boolean DEFAULT false NOT NULL,
	"disabled_at" timestamp with time zone,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "people_email_lower" CHECK ("people"."email" = lower("people"."email"))
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" text PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" timestamp with time zone
);
--> statement-breakpoint
CREATE TABLE "site_access" (
	"person_id" uuid NOT NULL,
	"site_id" uuid NOT NULL,
	CONSTRAINT "site_access_person_id_site_id_pk" PRIMARY KEY("person_id","site_id")
);
--> statement-breakpoint
CREATE TABLE "cases" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"controller_id" uuid NOT NULL,
	"circuit_id" uuid,
	"name" text NOT NULL,
	"kind" text NOT NULL,
	"food_class" text NOT NULL,
	"usual_c" double precision NOT NULL,
	"tau_hours" double precision,
	"limit_stricter" double precision,
	"runs_alone" boolean DEFAULT false NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "cases_tau" CHECK ("cases"."tau_hours" is null or "cases"."tau_hours" > 0)
);
--> statement-breakpoint
CREATE TABLE "circuits" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rack_id" uuid NOT NULL,
	"suction_group_id" uuid,
	"name" text NOT NULL,
	"defrost_kind" text NOT NULL,
	"defrosts" jsonb,
	"duration_min" integer DEFAULT 30 NOT NULL,
	"drip_min" integer DEFAULT 5 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "controllers" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"site_id" uuid NOT NULL,
	"name" text NOT NULL,
	"place" text DEFAULT '' NOT NULL,
	"panel_volts" integer,
	"notes" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "instruments" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"site_id" uuid NOT NULL,
	"name" text NOT NULL,
	"kind" text NOT NULL,
	"serial" text DEFAULT '' NOT NULL,
	"accuracy_c" double precision NOT NULL,
	"last_check_on" date,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "points" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"controller_id" uuid NOT NULL,
	"tag" text NOT NULL,
	"kind" text NOT NULL,
	"name" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"place" text DEFAULT '' NOT NULL,
	"means" text DEFAULT '' NOT NULL,
	"guards" text[] DEFAULT '{}' NOT NULL,
	"rack_id" uuid,
	"suction_group_id" uuid,
	"circuit_id" uuid,
	"case_ids" uuid[] DEFAULT '{}' NOT NULL,
	"drives" text,
	"rated_a" double precision,
	"capacity_kw" double precision,
	"min_off_min" double precision,
	"hand" jsonb,
	"on_loss" text DEFAULT 'unknown' NOT NULL,
	"through_off" boolean DEFAULT false NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "racks" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"controller_id" uuid NOT NULL,
	"name" text NOT NULL,
	"refrigerant" text NOT NULL,
	"high_cut_out_psig" double precision,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "sites" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"time_zone" text NOT NULL,
	"temperature_unit" text NOT NULL,
	"pressure_unit" text NOT NULL,
	"altitude_m" double precision DEFAULT 0 NOT NULL,
	"rulebook" text NOT NULL,
	"interval_minutes" integer DEFAULT 10 NOT NULL,
	"paper" text DEFAULT 'A4' NOT NULL,
	"contact_name" text DEFAULT '' NOT NULL,
	"contact_email" text DEFAULT '' NOT NULL,
	"contact_phone" text DEFAULT '' NOT NULL,
	"monitoring_email" text DEFAULT '' NOT NULL,
	"quiet_hours" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"outage_count" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "sites_interval" CHECK ("sites"."interval_minutes" between 1 and 60)
);
--> statement-breakpoint
CREATE TABLE "suction_groups" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"rack_id" uuid NOT NULL,
	"name" text NOT NULL,
	"stage" text NOT NULL,
	"target_suction_psig" double precision,
	"low_cut_out_psig" double precision,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
CREATE TABLE "work_kinds" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"steps" jsonb NOT NULL,
	"roll_back" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL
);
--> statement-breakpoint
ALTER TABLE "entries" ADD CONSTRAINT "entries_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "entries" ADD CONSTRAINT "entries_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "entries" ADD CONSTRAINT "entries_device_id_devices_id_fk" FOREIGN KEY ("device_id") REFERENCES "public"."devices"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "files" ADD CONSTRAINT "files_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outages" ADD CONSTRAINT "outages_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outages" ADD CONSTRAINT "outages_controller_id_controllers_id_fk" FOREIGN KEY ("controller_id") REFERENCES "public"."controllers"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refusals" ADD CONSTRAINT "refusals_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "refusals" ADD CONSTRAINT "refusals_device_id_devices_id_fk" FOREIGN KEY ("device_id") REFERENCES "public"."devices"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "devices" ADD CONSTRAINT "devices_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_access" ADD CONSTRAINT "site_access_person_id_people_id_fk" FOREIGN KEY ("person_id") REFERENCES "public"."people"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "site_access" ADD CONSTRAINT "site_access_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cases" ADD CONSTRAINT "cases_controller_id_controllers_id_fk" FOREIGN KEY ("controller_id") REFERENCES "public"."controllers"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "cases" ADD CONSTRAINT "cases_circuit_id_circuits_id_fk" FOREIGN KEY ("circuit_id") REFERENCES "public"."circuits"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "circuits" ADD CONSTRAINT "circuits_rack_id_racks_id_fk" FOREIGN KEY ("rack_id") REFERENCES "public"."racks"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "circuits" ADD CONSTRAINT "circuits_suction_group_id_suction_groups_id_fk" FOREIGN KEY ("suction_group_id") REFERENCES "public"."suction_groups"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "controllers" ADD CONSTRAINT "controllers_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "instruments" ADD CONSTRAINT "instruments_site_id_sites_id_fk" FOREIGN KEY ("site_id") REFERENCES "public"."sites"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "points" ADD CONSTRAINT "points_controller_id_controllers_id_fk" FOREIGN KEY ("controller_id") REFERENCES "public"."controllers"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "points" ADD CONSTRAINT "points_rack_id_racks_id_fk" FOREIGN KEY ("rack_id") REFERENCES "public"."racks"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "points" ADD CONSTRAINT "points_suction_group_id_suction_groups_id_fk" FOREIGN KEY ("suction_group_id") REFERENCES "public"."suction_groups"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "points" ADD CONSTRAINT "points_circuit_id_circuits_id_fk" FOREIGN KEY ("circuit_id") REFERENCES "public"."circuits"("id") ON DELETE set null ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "racks" ADD CONSTRAINT "racks_controller_id_controllers_id_fk" FOREIGN KEY ("controller_id") REFERENCES "public"."controllers"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "suction_groups" ADD CONSTRAINT "suction_groups_rack_id_racks_id_fk" FOREIGN KEY ("rack_id") REFERENCES "public"."racks"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "entries_id" ON "entries" USING btree ("id");--> statement-breakpoint
CREATE UNIQUE INDEX "entries_chain" ON "entries" USING btree ("outage_id","device_id","n");--> statement-breakpoint
CREATE UNIQUE INDEX "outages_code" ON "outages" USING btree ("code");--> statement-breakpoint
CREATE INDEX "outages_site_opened" ON "outages" USING btree ("site_id","opened_at" DESC NULLS LAST,"id" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "outages_opened" ON "outages" USING btree ("opened_at" DESC NULLS LAST,"id" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "outages_phase" ON "outages" USING btree ("phase","opened_at" DESC NULLS LAST);--> statement-breakpoint
CREATE INDEX "outages_controller" ON "outages" USING btree ("controller_id");--> statement-breakpoint
CREATE UNIQUE INDEX "refusals_id" ON "refusals" USING btree ("id");--> statement-breakpoint
CREATE UNIQUE INDEX "devices_public_key" ON "devices" USING btree ("public_key");--> statement-breakpoint
CREATE INDEX "devices_person" ON "devices" USING btree ("person_id");--> statement-breakpoint
CREATE UNIQUE INDEX "people_email" ON "people" USING btree ("email");--> statement-breakpoint
CREATE INDEX "site_access_site" ON "site_access" USING btree ("site_id");--> statement-breakpoint
CREATE UNIQUE INDEX "cases_name" ON "cases" USING btree ("controller_id","name");--> statement-breakpoint
CREATE INDEX "cases_circuit" ON "cases" USING btree ("circuit_id");--> statement-breakpoint
CREATE UNIQUE INDEX "circuits_name" ON "circuits" USING btree ("rack_id","name");--> statement-breakpoint
CREATE INDEX "circuits_suction_group" ON "circuits" USING btree ("suction_group_id");--> statement-breakpoint
CREATE UNIQUE INDEX "controllers_name" ON "controllers" USING btree ("site_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "instruments_name" ON "instruments" USING btree ("site_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "points_tag" ON "points" USING btree ("controller_id","tag");--> statement-breakpoint
CREATE INDEX "points_circuit" ON "points" USING btree ("circuit_id");--> statement-breakpoint
CREATE UNIQUE INDEX "racks_name" ON "racks" USING btree ("controller_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "sites_code" ON "sites" USING btree ("code");--> statement-breakpoint
CREATE UNIQUE INDEX "suction_groups_name" ON "suction_groups" USING btree ("rack_id","name");--> statement-breakpoint
CREATE UNIQUE INDEX "work_kinds_name" ON "work_kinds" USING btree ("name");