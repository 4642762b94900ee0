-- Second wall behind the queries. Every transaction says for whom it works by settings that end with it:
--   app.team_id      the team whose rows may be seen and written
--   app.user_id      the person: own account, own sessions, own memberships in every team
--   app.email        the address somebody signs in with, before it is known who they are
--   app.secret_hash  SHA-256 of a secret from a link or a header: opens the one row that holds it
--   app.outbox_id    the one mail that the sending job works on
--   app.outbox_open  'on' while demo mode shows mail that belongs to no team
-- A setting that is absent matches nothing. Policies hold for the owner too (FORCE); only a superuser or a role with
-- BYPASSRLS, as a backup needs, sees everything.
CREATE SCHEMA "app";
--> statement-breakpoint
CREATE FUNCTION "app"."team_id"() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  RETURN nullif(current_setting('app.team_id', true), '')::uuid;
--> statement-breakpoint
CREATE FUNCTION "app"."user_id"() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  RETURN nullif(current_setting('app.user_id', true), '')::uuid;
--> statement-breakpoint
CREATE FUNCTION "app"."outbox_id"() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
  RETURN nullif(current_setting('app.outbox_id', true), '')::uuid;
--> statement-breakpoint
CREATE FUNCTION "app"."email"() RETURNS text LANGUAGE sql STABLE PARALLEL SAFE
  RETURN nullif(current_setting('app.email', true), '');
--> statement-breakpoint
CREATE FUNCTION "app"."secret_hash"() RETURNS text LANGUAGE sql STABLE PARALLEL SAFE
  RETURN nullif(current_setting('app.secret_hash', true), '');
--> statement-breakpoint
CREATE FUNCTION "app"."outbox_open"() RETURNS boolean LANGUAGE sql STABLE PARALLEL SAFE
  RETURN coalesce(current_setting('app.outbox_open', true), '') = 'on';
--> statement-breakpoint
DO $$
DECLARE name text;
BEGIN
  FOREACH name IN ARRAY ARRAY['users', 'teams', 'memberships', 'sessions', 'invitations', 'password_resets', 'access_tokens',
    'outbox', 'audit_events', 'idempotency_keys', 'plants', 'plant_revisions', 'designs', 'design_revisions', 'evidence',
    'response_records', 'comparisons', 'templates']
  LOOP
    EXECUTE format('ALTER TABLE %I ENABLE ROW LEVEL SECURITY', name);
    EXECUTE format('ALTER TABLE %I FORCE ROW LEVEL SECURITY', name);
  END LOOP;
  FOREACH name IN ARRAY ARRAY['plants', 'plant_revisions', 'designs', 'design_revisions', 'evidence', 'response_records',
    'comparisons', 'templates']
  LOOP
    EXECUTE format('CREATE POLICY own_team ON %I USING (team_id = app.team_id()) WITH CHECK (team_id = app.team_id())', name);
  END LOOP;
END $$;
--> statement-breakpoint
CREATE POLICY "seen" ON "memberships" FOR SELECT USING (team_id = app.team_id() OR user_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "added" ON "memberships" FOR INSERT WITH CHECK (team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "memberships" FOR UPDATE USING (team_id = app.team_id()) WITH CHECK (team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "seen" ON "users" FOR SELECT USING (
  id = app.user_id() OR email = app.email()
  OR EXISTS (SELECT 1 FROM memberships WHERE memberships.user_id = users.id AND memberships.team_id = app.team_id())
);
--> statement-breakpoint
CREATE POLICY "added" ON "users" FOR INSERT WITH CHECK (id = app.user_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "users" FOR UPDATE USING (id = app.user_id()) WITH CHECK (id = app.user_id());
--> statement-breakpoint
CREATE POLICY "seen" ON "teams" FOR SELECT USING (
  id = app.team_id()
  OR EXISTS (SELECT 1 FROM memberships WHERE memberships.team_id = teams.id AND memberships.user_id = app.user_id()
    AND memberships.removed_at IS NULL)
);
--> statement-breakpoint
CREATE POLICY "added" ON "teams" FOR INSERT WITH CHECK (id = app.team_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "teams" FOR UPDATE USING (id = app.team_id()) WITH CHECK (id = app.team_id());
--> statement-breakpoint
CREATE POLICY "seen" ON "sessions" FOR SELECT USING (user_id = app.user_id() OR team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "added" ON "sessions" FOR INSERT WITH CHECK (user_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "sessions" FOR UPDATE USING (user_id = app.user_id() OR team_id = app.team_id())
  WITH CHECK (user_id = app.user_id() OR team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "seen" ON "invitations" FOR SELECT USING (team_id = app.team_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "added" ON "invitations" FOR INSERT WITH CHECK (team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "invitations" FOR UPDATE USING (team_id = app.team_id() OR token_hash = app.secret_hash())
  WITH CHECK (team_id = app.team_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "seen" ON "password_resets" FOR SELECT USING (user_id = app.user_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "added" ON "password_resets" FOR INSERT WITH CHECK (user_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "password_resets" FOR UPDATE USING (user_id = app.user_id() OR token_hash = app.secret_hash())
  WITH CHECK (user_id = app.user_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "seen" ON "access_tokens" FOR SELECT USING (team_id = app.team_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "added" ON "access_tokens" FOR INSERT WITH CHECK (team_id = app.team_id() AND user_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "changed" ON "access_tokens" FOR UPDATE USING (team_id = app.team_id() OR token_hash = app.secret_hash())
  WITH CHECK (team_id = app.team_id() OR token_hash = app.secret_hash());
--> statement-breakpoint
CREATE POLICY "seen" ON "outbox" FOR SELECT USING (
  team_id = app.team_id() OR id = app.outbox_id() OR (team_id IS NULL AND app.outbox_open())
);
--> statement-breakpoint
CREATE POLICY "added" ON "outbox" FOR INSERT WITH CHECK (team_id = app.team_id() OR team_id IS NULL);
--> statement-breakpoint
CREATE POLICY "changed" ON "outbox" FOR UPDATE USING (id = app.outbox_id()) WITH CHECK (id = app.outbox_id());
--> statement-breakpoint
CREATE POLICY "seen" ON "audit_events" FOR SELECT USING (team_id = app.team_id());
--> statement-breakpoint
CREATE POLICY "added" ON "audit_events" FOR INSERT WITH CHECK (team_id = app.team_id() OR actor_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "own" ON "idempotency_keys" USING (team_id = app.team_id() AND user_id = app.user_id())
  WITH CHECK (team_id = app.team_id() AND user_id = app.user_id());
