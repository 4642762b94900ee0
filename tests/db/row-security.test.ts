import type pg from "pg";
import { describe, expect, test } from "vitest";
import { connect } from "@/lib/commands/databases.mjs";
import { type FilledTeam, fillTeam, guardedTables } from "../helpers/filled-team";
import { testDatabase } from "../helpers/test-database";

const { appUrl, ownerUrl, adminUrl } = await testDatabase();
const admin = await connect(adminUrl);
const app = await connect(appUrl);
const owner = await connect(ownerUrl);
const ours = await fillTeam(admin);
const theirs = await fillTeam(admin);
const tables = await guardedTables(admin);
/** Of these a person's rows are known by the person, not by a team. */
const personal = ["password_resets", "users"];
const settingsOf = ({ teamId, userId }: FilledTeam) => ({ "app.team_id": teamId, "app.user_id": userId });

async function asking<T>(client: pg.Client, settings: Record<string, string>, work: () => Promise<T>): Promise<T> {
  await client.query("begin");
  try {
    for (const [name, value] of Object.entries(settings)) await client.query("select set_config($1, $2, true)", [name, value]);
    return await work();
  } finally {
    await client.query("rollback");
  }
}

async function count(client: pg.Client, table: string, condition = "true", values: unknown[] = []): Promise<number> {
  const { rows } = await client.query<{ count: number }>(
    `select count(*)::int as count from ${table} where ${condition}`,
    values,
  );
  return rows[0].count;
}

async function stateOf(promise: Promise<unknown>): Promise<string> {
  return promise.then(
    () => "done",
    (error: { code?: string }) => error.code ?? "no code",
  );
}

test("every table but the counters of the rate limiter is guarded, for its owner too", async () => {
  const { rows } = await admin.query<{ name: string }>(
    "select relname as name from pg_class where relnamespace = 'public'::regnamespace and relkind = 'r' and not (relrowsecurity and relforcerowsecurity)",
  );
  expect(rows).toEqual([{ name: "rate_limits" }]);
});

test("the role that serves owns nothing, passes by no row security and makes nothing", async () => {
  const { rows } = await admin.query(
    "select rolsuper, rolbypassrls, rolcreaterole, rolcreatedb from pg_roles where rolname = 'gainwright_app'",
  );
  expect(rows).toEqual([{ rolsuper: false, rolbypassrls: false, rolcreaterole: false, rolcreatedb: false }]);
  expect(await count(admin, "pg_class", "relowner = 'gainwright_app'::regrole")).toBe(0);
  expect(await stateOf(app.query("create table public.mine ()"))).toBe("42501");
  expect(await stateOf(app.query("create temporary table mine ()"))).toBe("42501");
  expect(await stateOf(app.query("select count(*) from graphile_worker.jobs"))).toBe("42501");
});

describe.each(tables)("%s", (table) => {
  test("without a setting shows no row, to the role that serves and to the owner", async () => {
    expect(await count(admin, table)).toBeGreaterThanOrEqual(2);
    expect(await asking(app, {}, () => count(app, table))).toBe(0);
    expect(await asking(owner, {}, () => count(owner, table))).toBe(0);
  });

  test("shows a team its own rows and none of another's", async () => {
    const key = personal.includes(table) ? (table === "users" ? "id" : "user_id") : table === "teams" ? "id" : "team_id";
    const id = personal.includes(table) ? "userId" : "teamId";
    await asking(app, settingsOf(ours), async () => {
      expect(await count(app, table, `${key} = $1`, [ours[id]])).toBeGreaterThanOrEqual(1);
      expect(await count(app, table, `${key} = $1`, [theirs[id]])).toBe(0);
      expect(await count(app, table, `${key} <> $1`, [ours[id]])).toBe(0);
    });
  });

  test("takes no row for another team", async () => {
    const { rows } = await admin.query<{ column: string }>(
      "select column_name as column from information_schema.columns where table_schema = 'public' and table_name = $1 and column_name = 'team_id'",
      [table],
    );
    const column = rows.at(0)?.column ?? (table === "teams" || table === "users" ? "id" : "user_id");
    // A copy of their row under a new key, written by ours: the policy refuses before any constraint is looked at.
    const list = (
      await admin.query<{ name: string }>(
        "select column_name as name from information_schema.columns where table_schema = 'public' and table_name = $1 and is_generated = 'NEVER'",
        [table],
      )
    ).rows.map(({ name }) => name);
    const found = await admin.query(`select * from ${table} where ${column} = $1 limit 1`, [
      column === "user_id" || table === "users" ? theirs.userId : theirs.teamId,
    ]);
    const values = list.map((name) => found.rows[0][name]);
    const places = list.map((_, index) => `$${index + 1}`);
    const statement = `insert into ${table} (${list.join(", ")}) values (${places.join(", ")})`;
    // A comparison's trigger looks before the policy does, and finds none of their revisions.
    const refused = table === "comparisons" ? "23503" : "42501";
    expect(await asking(app, settingsOf(ours), () => stateOf(app.query(statement, values)))).toBe(refused);
    expect(await asking(owner, settingsOf(ours), () => stateOf(owner.query(statement, values)))).toBe(refused);
  });
});

test("a secret opens the one row that holds it and nothing else", async () => {
  for (const table of ["invitations", "access_tokens", "password_resets"]) {
    const { rows } = await admin.query<{ id: string; token_hash: string }>(`select id, token_hash from ${table} limit 1`);
    const seen = await asking(app, { "app.secret_hash": rows[0].token_hash }, () => app.query(`select id from ${table}`));
    expect(seen.rows, table).toEqual([{ id: rows[0].id }]);
  }
});

test("a draft is seen and written by its writer only, not by a colleague", async () => {
  const { teamId, designId } = ours;
  const colleague = { "app.team_id": teamId, "app.user_id": theirs.userId };
  expect(await asking(app, colleague, () => count(app, "design_drafts"))).toBe(0);
  expect(await asking(app, { "app.team_id": teamId }, () => count(app, "design_drafts"))).toBe(0);
  const change = "update design_drafts set form = '{}' where design_id = $1";
  expect((await asking(app, colleague, () => app.query(change, [designId]))).rowCount).toBe(0);
  expect((await asking(app, settingsOf(ours), () => app.query(change, [designId]))).rowCount).toBe(1);
  const copy = `insert into design_drafts (team_id, user_id, subject_id, plant_id, plant_revision_id, form, mark)
    values ($1, $2, $3, $3, $4, '{}', gen_random_uuid())`;
  const values = [teamId, ours.userId, ours.plantId, ours.revisionId];
  expect(await asking(app, colleague, () => stateOf(app.query(copy, values)))).toBe("42501");
  expect(await asking(app, settingsOf(ours), () => stateOf(app.query(copy, values)))).toBe("done");
});

test("an address opens the one account that it names", async () => {
  const seen = await asking(app, { "app.email": `${ours.userId}@saltmarsh.example` }, () => app.query("select id from users"));
  expect(seen.rows).toEqual([{ id: ours.userId }]);
});

test("mail that belongs to no team is seen by the job that sends it, and by the demo's page", async () => {
  await admin.query("insert into outbox (recipient, subject, text, html) values ('x@saltmarsh.example', 's', 't', 'h')");
  const open = "team_id is null";
  expect(await asking(app, settingsOf(ours), () => count(app, "outbox", open))).toBe(0);
  expect(await asking(app, { ...settingsOf(ours), "app.outbox_open": "on" }, () => count(app, "outbox", open))).toBe(1);
  const { rows } = await admin.query<{ id: string }>(`select id from outbox where ${open}`);
  expect(await asking(app, { "app.outbox_id": rows[0].id }, () => count(app, "outbox"))).toBe(1);
});

test("settings end with their transaction, so the next user of a connection sees nothing", async () => {
  await app.query("begin");
  await app.query("select set_config('app.team_id', $1, true)", [ours.teamId]);
  expect(await count(app, "plants")).toBe(1);
  await app.query("commit");
  expect(await count(app, "plants")).toBe(0);
});
