import { randomUUID } from "node:crypto";
import type pg from "pg";

export type FilledTeam = Readonly<
  Record<"teamId" | "userId" | "plantId" | "revisionId" | "designId" | "designRevisionId", string>
>;

/** As much of the documents as the tables themselves ask for. */
export const EMPTY_MODEL = { axes: [], timeBase: { kind: "continuous" }, states: [], inputs: [], outputs: [] };
export const EMPTY_RECIPE = { method: "weights", observer: { kind: "none" } };
const EMPTY_TEMPLATE = { plant: { states: [] }, openParameters: [] };

/** Two design revisions, so that a comparison can stand; one row at least in every table that knows a team. */
export async function fillTeam(admin: pg.Client): Promise<FilledTeam> {
  const [teamId, userId, plantId, revisionId, designId, designRevisionId, second] = Array.from({ length: 7 }, () => randomUUID());
  const hash = () => randomUUID().replaceAll("-", "").padEnd(64, "0");
  const put = (table: string, row: Record<string, unknown>) => {
    const names = Object.keys(row);
    const places = names.map((_, index) => `$${index + 1}`);
    return admin.query(`insert into ${table} (${names.join(", ")}) values (${places.join(", ")})`, Object.values(row));
  };
  const later = new Date(Date.now() + 3_000_000);
  const made = { team_id: teamId, created_by: userId };
  await put("users", { id: userId, email: `${userId}@saltmarsh.example`, name: "Filled Person", password_hash: "none" });
  await put("teams", { id: teamId, name: "Filled Team" });
  await put("memberships", { team_id: teamId, user_id: userId, role: "lead" });
  await put("sessions", { user_id: userId, team_id: teamId, expires_at: later });
  const invited = { invited_by: userId, email: "new@saltmarsh.example", role: "engineer", token_hash: hash(), expires_at: later };
  await put("invitations", { team_id: teamId, ...invited });
  await put("password_resets", { user_id: userId, token_hash: hash(), expires_at: later });
  const token = { name: "Script", token_hash: hash(), scope: "read", expires_at: later };
  await put("access_tokens", { team_id: teamId, user_id: userId, ...token });
  await put("outbox", { team_id: teamId, recipient: "new@saltmarsh.example", subject: "s", text: "t", html: "h" });
  await put("plants", { id: plantId, ...made, name: "Gantry" });
  await put("plant_revisions", { id: revisionId, ...made, plant_id: plantId, number: 1, content: {}, model: EMPTY_MODEL });
  await put("designs", { id: designId, ...made, plant_id: plantId, name: "First" });
  const pinned = {
    plant_id: plantId,
    design_id: designId,
    plant_revision_id: revisionId,
    recipe: EMPTY_RECIPE,
    method_version: "1",
  };
  await put("design_revisions", { id: designRevisionId, ...made, ...pinned, number: 1 });
  await put("design_revisions", { id: second, ...made, ...pinned, number: 2 });
  await put("evidence", { team_id: teamId, design_revision_id: designRevisionId, part: "gains", state: "computed", content: {} });
  const curve = { position: 0, kind: "step", loop: "full-state", source: 0, amplitude: 1, samples: 2, step: 0.1 };
  await put("response_records", { team_id: teamId, design_revision_id: designRevisionId, ...curve, values: Buffer.alloc(16) });
  // An earlier release's database, which a test may fill before it is migrated, has no drafts.
  const { rows: drafts } = await admin.query(
    "select 1 from pg_tables where schemaname = 'public' and tablename = 'design_drafts'",
  );
  if (drafts.length > 0) {
    const draft = { subject_id: designId, plant_id: plantId, design_id: designId, plant_revision_id: revisionId };
    await put("design_drafts", { team_id: teamId, user_id: userId, ...draft, form: {}, mark: randomUUID() });
  }
  const compared = { title: "Both", design_revision_ids: [designRevisionId, second] };
  await put("comparisons", { ...made, plant_id: plantId, ...compared });
  await put("templates", { ...made, name: "Template", content: EMPTY_TEMPLATE });
  const event = { kind: "plant.created", subject_type: "plant", subject_id: plantId, request_id: "request" };
  await put("audit_events", { team_id: teamId, actor_id: userId, ...event });
  await put("idempotency_keys", { team_id: teamId, user_id: userId, route: "POST /plants", key: "k", body_hash: "h" });
  return { teamId, userId, plantId, revisionId, designId, designRevisionId };
}

/** Every table that row security guards, in the order of their names. */
export async function guardedTables(admin: pg.Client): Promise<string[]> {
  const { rows } = await admin.query<{ name: string }>(
    "select relname as name from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r' and relrowsecurity order by 1",
  );
  return rows.map((row) => row.name);
}
