/** The role that serves. It owns nothing and sees through row security only. */
export const APP_ROLE = "gainwright_app";

/** Everything the app role may do, table by table; what is not here is refused. Columns narrow what an UPDATE may touch. */
export const TABLE_GRANTS: Readonly<Record<string, string>> = {
  users: "SELECT, INSERT, UPDATE (name, password_hash)",
  teams: "SELECT, INSERT, UPDATE (name)",
  memberships: "SELECT, INSERT, UPDATE (role, removed_at)",
  sessions: "SELECT, INSERT, UPDATE (team_id, last_seen_at, revoked_at), DELETE",
  invitations: "SELECT, INSERT, UPDATE (accepted_at, withdrawn_at)",
  password_resets: "SELECT, INSERT, UPDATE (used_at), DELETE",
  access_tokens: "SELECT, INSERT, UPDATE (last_used_at, revoked_at)",
  outbox: "SELECT, INSERT, UPDATE (sent_at, attempts, last_error), DELETE",
  audit_events: "SELECT, INSERT",
  idempotency_keys: "SELECT, INSERT, UPDATE (status, reply), DELETE",
  rate_limits: "SELECT, INSERT, UPDATE, DELETE",
  plants: "SELECT, INSERT, UPDATE (name, version, current_revision, criteria, archived_at, updated_at)",
  plant_revisions: "SELECT, INSERT",
  designs: "SELECT, INSERT, UPDATE (name, version, current_revision, archived_at, updated_at)",
  design_revisions: "SELECT, INSERT",
  design_drafts: "SELECT, INSERT, UPDATE (plant_revision_id, base_revision_id, base_version, form, mark, updated_at), DELETE",
  evidence: "SELECT, INSERT",
  response_records: "SELECT, INSERT",
  comparisons: "SELECT, INSERT, UPDATE (title, note, design_revision_ids, version, archived_at, updated_at)",
  templates: "SELECT, INSERT, UPDATE (name, description, content, version, archived_at, updated_at)",
};

/** Run after every migration: taken away first, so that the list above is the whole truth. */
export function grantStatements(): string[] {
  return [
    `REVOKE ALL ON ALL TABLES IN SCHEMA public FROM ${APP_ROLE}`,
    `REVOKE CREATE ON SCHEMA public FROM PUBLIC`,
    `GRANT USAGE ON SCHEMA public, app TO ${APP_ROLE}`,
    `GRANT EXECUTE ON ALL FUNCTIONS IN SCHEMA app TO ${APP_ROLE}`,
    ...Object.entries(TABLE_GRANTS).map(([table, rights]) => `GRANT ${rights} ON public.${table} TO ${APP_ROLE}`),
  ];
}
