-- What nobody needs any more may go, in a transaction that says so:
--   app.sweeping    'on' in the daily sweep
-- Then rows that are old enough can be seen and removed, of every team, and no others, whatever the statement asks for.
CREATE FUNCTION "app"."sweeping"() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  RETURN coalesce(current_setting('app.sweeping', true), '') = 'on';
--> statement-breakpoint
DO $$
DECLARE
  name text;
  due text;
BEGIN
  FOR name, due IN VALUES
    ('sessions', 'least(expires_at, revoked_at) < now() - interval ''30 days'''),
    ('password_resets', 'expires_at < now() - interval ''30 days'''),
    ('outbox', 'coalesce(sent_at, created_at) < now() - interval ''30 days'''),
    ('idempotency_keys', 'created_at < now() - interval ''24 hours''')
  LOOP
    EXECUTE format('CREATE POLICY due ON %I FOR SELECT USING (app.sweeping() AND %s)', name, due);
    EXECUTE format('CREATE POLICY swept ON %I FOR DELETE USING (app.sweeping() AND %s)', name, due);
  END LOOP;
END $$;
