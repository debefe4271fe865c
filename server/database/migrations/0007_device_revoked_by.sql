ALTER TABLE "devices" ADD COLUMN "revoked_by" uuid;--> statement-breakpoint
ALTER TABLE "devices" ADD COLUMN "replaced_by" uuid;--> statement-breakpoint
ALTER TABLE "devices" ADD CONSTRAINT "devices_revoked_by_people_id_fk" FOREIGN KEY ("revoked_by") REFERENCES "public"."people"("id") ON DELETE restrict ON UPDATE no action;