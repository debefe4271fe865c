-- Refusals kept before this were answered with 422 when they came again.
ALTER TABLE "refusals" ADD COLUMN "code" integer NOT NULL DEFAULT 422;--> statement-breakpoint
ALTER TABLE "refusals" ALTER COLUMN "code" DROP DEFAULT;--> statement-breakpoint
ALTER TABLE "refusals" ADD COLUMN "field" text;
