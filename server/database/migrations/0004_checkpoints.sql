ALTER TABLE "entries" ADD COLUMN "checkpoint" jsonb;--> statement-breakpoint
ALTER TABLE "outages" ADD COLUMN "frontier" jsonb;--> statement-breakpoint
ALTER TABLE "outages" ADD COLUMN "checkpoint" jsonb;