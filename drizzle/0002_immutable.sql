-- The app role has no UPDATE or DELETE here either; the trigger also stops the owner and every later grant.
CREATE FUNCTION "app"."refuse_change"() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  RAISE EXCEPTION 'rows of % are never changed or removed', TG_TABLE_NAME USING ERRCODE = 'object_not_in_prerequisite_state';
END $$;
--> statement-breakpoint
DO $$
DECLARE name text;
BEGIN
  FOREACH name IN ARRAY ARRAY['plant_revisions', 'design_revisions', 'evidence', 'response_records', 'audit_events'] LOOP
    EXECUTE format('CREATE TRIGGER immutable BEFORE UPDATE OR DELETE ON %I FOR EACH ROW EXECUTE FUNCTION app.refuse_change()', name);
    EXECUTE format('CREATE TRIGGER never_emptied BEFORE TRUNCATE ON %I FOR EACH STATEMENT EXECUTE FUNCTION app.refuse_change()', name);
  END LOOP;
END $$;
--> statement-breakpoint
-- Doubles hardly compress: spare the attempt on every write and read.
ALTER TABLE "response_records" ALTER COLUMN "values" SET STORAGE EXTERNAL;
--> statement-breakpoint
-- An array cannot carry a foreign key. Row security holds inside too: another team's revisions do not count.
CREATE FUNCTION "app"."check_compared_revisions"() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
  IF (SELECT count(*) FROM public.design_revisions d
      WHERE d.team_id = NEW.team_id AND d.plant_id = NEW.plant_id AND d.id = ANY (NEW.design_revision_ids))
    <> cardinality(NEW.design_revision_ids)
  THEN
    RAISE EXCEPTION 'compared revisions must be different ones of this plant' USING ERRCODE = 'foreign_key_violation';
  END IF;
  RETURN NEW;
END $$;
--> statement-breakpoint
CREATE TRIGGER compared_revisions BEFORE INSERT OR UPDATE OF design_revision_ids, plant_id, team_id ON "comparisons"
  FOR EACH ROW EXECUTE FUNCTION app.check_compared_revisions();
--> statement-breakpoint
-- The queue's own function fails under the app role's row security, so the owner holds this door, for mail alone.
CREATE FUNCTION "app"."enqueue_mail"("outbox_id" uuid) RETURNS void LANGUAGE plpgsql SECURITY DEFINER
  SET search_path = pg_catalog, pg_temp AS $$
BEGIN
  PERFORM graphile_worker.add_job('send-mail', json_build_object('outboxId', outbox_id),
    max_attempts => 5, job_key => 'mail:' || outbox_id);
END $$;
--> statement-breakpoint
REVOKE ALL ON FUNCTION "app"."enqueue_mail"(uuid) FROM PUBLIC;
