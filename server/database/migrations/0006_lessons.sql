CREATE TABLE "case_lessons" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"outage_id" uuid NOT NULL,
	"outage_code" text NOT NULL,
	"accepted_by" uuid NOT NULL,
	"accepted_name" text NOT NULL,
	"accepted_at" timestamp with time zone NOT NULL,
	"case_id" uuid NOT NULL,
	"tau_hours" double precision NOT NULL,
	"readings" integer NOT NULL,
	"rmse_k" double precision NOT NULL,
	CONSTRAINT "case_lessons_tau" CHECK ("case_lessons"."tau_hours" > 0)
);
--> statement-breakpoint
CREATE TABLE "step_lessons" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"outage_id" uuid NOT NULL,
	"outage_code" text NOT NULL,
	"accepted_by" uuid NOT NULL,
	"accepted_name" text NOT NULL,
	"accepted_at" timestamp with time zone NOT NULL,
	"work_kind_id" uuid NOT NULL,
	"step" text NOT NULL,
	"minutes" double precision NOT NULL,
	"before" jsonb NOT NULL,
	"after" jsonb NOT NULL
);
--> statement-breakpoint
ALTER TABLE "case_lessons" ADD CONSTRAINT "case_lessons_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "case_lessons" ADD CONSTRAINT "case_lessons_accepted_by_people_id_fk" FOREIGN KEY ("accepted_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "case_lessons" ADD CONSTRAINT "case_lessons_case_id_cases_id_fk" FOREIGN KEY ("case_id") REFERENCES "public"."cases"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "step_lessons" ADD CONSTRAINT "step_lessons_outage_id_outages_id_fk" FOREIGN KEY ("outage_id") REFERENCES "public"."outages"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "step_lessons" ADD CONSTRAINT "step_lessons_accepted_by_people_id_fk" FOREIGN KEY ("accepted_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "step_lessons" ADD CONSTRAINT "step_lessons_work_kind_id_work_kinds_id_fk" FOREIGN KEY ("work_kind_id") REFERENCES "public"."work_kinds"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
CREATE UNIQUE INDEX "case_lessons_once" ON "case_lessons" USING btree ("case_id","outage_id");--> statement-breakpoint
CREATE INDEX "case_lessons_outage" ON "case_lessons" USING btree ("outage_id");--> statement-breakpoint
CREATE UNIQUE INDEX "step_lessons_once" ON "step_lessons" USING btree ("work_kind_id","step","outage_id");--> statement-breakpoint
CREATE INDEX "step_lessons_outage" ON "step_lessons" USING btree ("outage_id");