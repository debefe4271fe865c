-- A whole record may go, in one narrow way: by the statement that an administrator signed. Its row in "deletions" is taken only
-- where the record has ended, is under no legal hold and has been kept for as long as it is to be kept; and only the transaction
-- that writes this row may delete the entries. What the statement says is held against the log itself, not against projections.
CREATE FUNCTION guard_deletion() RETURNS trigger LANGUAGE plpgsql AS $$
DECLARE
  kept "outages"%ROWTYPE;
  entry_count integer;
  last_at timestamptz;
  has_ended boolean;
  last_root text;
  years integer;
  said jsonb;
BEGIN
  SELECT * INTO kept FROM "outages" WHERE "id" = NEW."outage_id" FOR UPDATE;
  IF NOT FOUND THEN
    RAISE EXCEPTION 'there is no such record' USING ERRCODE = 'restrict_violation';
  END IF;
  SELECT count(*), max("received_at"), coalesce(bool_or("kind" IN ('sealed', 'called-off') AND "standing" = 'accepted'), false)
    INTO entry_count, last_at, has_ended FROM "entries" WHERE "outage_id" = kept."id";
  IF NOT has_ended OR kept."phase" NOT IN ('sealed', 'called-off') THEN
    RAISE EXCEPTION 'the record has not ended' USING ERRCODE = 'restrict_violation';
  END IF;
  IF EXISTS (SELECT 1 FROM "legal_holds" WHERE "outage_id" = kept."id" AND "lifted_at" IS NULL) THEN
    RAISE EXCEPTION 'the record is under legal hold' USING ERRCODE = 'restrict_violation';
  END IF;
  years := greatest(
    coalesce((SELECT r."years" FROM "retention" r WHERE r."site_id" IS NULL), 2),
    coalesce((SELECT r."years" FROM "retention" r WHERE r."site_id" = kept."site_id"), 0));
  IF ((last_at AT TIME ZONE 'UTC') + make_interval(years => years)) AT TIME ZONE 'UTC' > clock_timestamp() THEN
    RAISE EXCEPTION 'the record is to be kept for % years', years USING ERRCODE = 'restrict_violation';
  END IF;
  SELECT "checkpoint" -> 'statement' ->> 'root' INTO last_root FROM "entries" WHERE "outage_id" = kept."id" AND "seq" = entry_count;
  said := NEW."statement"::jsonb;
  IF said ->> 'type' IS DISTINCT FROM 'holdover-deletion'
    OR said ->> 'outage' IS DISTINCT FROM kept."id"::text
    OR said ->> 'code' IS DISTINCT FROM kept."code"
    OR said ->> 'by' IS DISTINCT FROM NEW."person_id"::text
    OR said ->> 'device' IS DISTINCT FROM NEW."device_id"::text
    OR said ->> 'size' IS DISTINCT FROM entry_count::text OR NEW."size" <> entry_count
    OR said ->> 'root' IS DISTINCT FROM NEW."root" OR (last_root IS NOT NULL AND NEW."root" <> last_root)
    OR coalesce(said ->> 'reason', '') = '' OR length(NEW."signature") <> 86 THEN
    RAISE EXCEPTION 'the statement is not about this record' USING ERRCODE = 'restrict_violation';
  END IF;
  NEW."transaction" := pg_current_xact_id()::text;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER deletions_guard BEFORE INSERT ON "deletions" FOR EACH ROW EXECUTE FUNCTION guard_deletion();
--> statement-breakpoint
-- A statement stands for a record that is gone: at the end of its transaction nothing of the record is there.
CREATE FUNCTION demand_deletion() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (SELECT 1 FROM "outages" WHERE "id" = NEW."outage_id") OR EXISTS (SELECT 1 FROM "entries" WHERE "outage_id" = NEW."outage_id") THEN
    RAISE EXCEPTION 'the record is still there' USING ERRCODE = 'restrict_violation';
  END IF;
  RETURN NULL;
END
$$;
--> statement-breakpoint
CREATE CONSTRAINT TRIGGER deletions_done AFTER INSERT ON "deletions" DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION demand_deletion();
--> statement-breakpoint
CREATE FUNCTION refuse_deletion_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'what stays of a deleted record is never changed' USING ERRCODE = 'restrict_violation';
END
$$;
--> statement-breakpoint
CREATE TRIGGER deletions_append_only BEFORE UPDATE OR DELETE ON "deletions" FOR EACH ROW EXECUTE FUNCTION refuse_deletion_change();
--> statement-breakpoint
CREATE TRIGGER deletions_no_truncate BEFORE TRUNCATE ON "deletions" FOR EACH STATEMENT EXECUTE FUNCTION refuse_deletion_change();
--> statement-breakpoint
CREATE FUNCTION refuse_unless_deleted() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (SELECT 1 FROM "deletions" WHERE "outage_id" = OLD."outage_id" AND "transaction" = pg_current_xact_id()::text) THEN
    RETURN OLD;
  END IF;
  RAISE EXCEPTION 'the log is append-only' USING ERRCODE = 'restrict_violation';
END
$$;
--> statement-breakpoint
DROP TRIGGER entries_append_only ON "entries";
--> statement-breakpoint
CREATE TRIGGER entries_append_only BEFORE UPDATE ON "entries" FOR EACH ROW EXECUTE FUNCTION refuse_change();
--> statement-breakpoint
CREATE TRIGGER entries_kept BEFORE DELETE ON "entries" FOR EACH ROW EXECUTE FUNCTION refuse_unless_deleted();
--> statement-breakpoint
-- A legal hold is lifted once, and changed in nothing else; it goes only with its record.
CREATE FUNCTION guard_hold_change() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF OLD."lifted_at" IS NOT NULL OR NEW."lifted_at" IS NULL OR NEW."lifted_by_id" IS NULL OR coalesce(NEW."lifted_reason", '') = ''
    OR (NEW."id", NEW."outage_id", NEW."person_id", NEW."person_name", NEW."at", NEW."reason")
      IS DISTINCT FROM (OLD."id", OLD."outage_id", OLD."person_id", OLD."person_name", OLD."at", OLD."reason") THEN
    RAISE EXCEPTION 'a legal hold is only ever lifted' USING ERRCODE = 'restrict_violation';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER legal_holds_lifted BEFORE UPDATE ON "legal_holds" FOR EACH ROW EXECUTE FUNCTION guard_hold_change();
--> statement-breakpoint
CREATE TRIGGER legal_holds_kept BEFORE DELETE ON "legal_holds" FOR EACH ROW EXECUTE FUNCTION refuse_unless_deleted();
--> statement-breakpoint
CREATE TRIGGER legal_holds_no_truncate BEFORE TRUNCATE ON "legal_holds" FOR EACH STATEMENT EXECUTE FUNCTION refuse_deletion_change();
--> statement-breakpoint
-- What was deleted is never opened again under its id.
CREATE FUNCTION refuse_reopening() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF EXISTS (SELECT 1 FROM "deletions" WHERE "outage_id" = NEW."id") THEN
    RAISE EXCEPTION 'this record was deleted' USING ERRCODE = 'restrict_violation';
  END IF;
  RETURN NEW;
END
$$;
--> statement-breakpoint
CREATE TRIGGER outages_not_again BEFORE INSERT ON "outages" FOR EACH ROW EXECUTE FUNCTION refuse_reopening();
