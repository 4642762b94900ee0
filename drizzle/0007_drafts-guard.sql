-- A draft is its writer's alone: colleagues of the team do not see it either. Old ones go in the daily sweep.
ALTER TABLE "design_drafts" ENABLE ROW LEVEL SECURITY;
--> statement-breakpoint
ALTER TABLE "design_drafts" FORCE ROW LEVEL SECURITY;
--> statement-breakpoint
CREATE POLICY "own" ON "design_drafts" USING (team_id = app.team_id() AND user_id = app.user_id())
  WITH CHECK (team_id = app.team_id() AND user_id = app.user_id());
--> statement-breakpoint
CREATE POLICY "due" ON "design_drafts" FOR SELECT USING (app.sweeping() AND updated_at < now() - interval '90 days');
--> statement-breakpoint
CREATE POLICY "swept" ON "design_drafts" FOR DELETE USING (app.sweeping() AND updated_at < now() - interval '90 days');
