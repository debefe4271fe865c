ALTER TABLE "racks" ADD COLUMN "warmest_c" double precision;--> statement-breakpoint
ALTER TABLE "racks" ADD COLUMN "relief_valves" text[] DEFAULT '{}' NOT NULL;