DROP INDEX "outages_site_opened";--> statement-breakpoint
DROP INDEX "outages_opened";--> statement-breakpoint
DROP INDEX "outages_phase";--> statement-breakpoint
CREATE INDEX "outage_search_phase" ON "outage_search" USING btree ("phase","opened_at","outage_id");--> statement-breakpoint
CREATE INDEX "outage_search_work" ON "outage_search" USING btree ("work_kind","opened_at","outage_id");--> statement-breakpoint
CREATE INDEX "outages_site_opened" ON "outages" USING btree ("site_id","opened_at","id");--> statement-breakpoint
CREATE INDEX "outages_opened" ON "outages" USING btree ("opened_at","id");--> statement-breakpoint
CREATE INDEX "outages_phase" ON "outages" USING btree ("phase","opened_at","id");--> statement-breakpoint
-- A controller stands at one site: without this the planner takes the two for independent, and reads tables whole.
CREATE STATISTICS outage_search_places (dependencies) ON site_id, controller_id FROM outage_search;
