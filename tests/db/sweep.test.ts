import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { asVisitor, closePool } from "@/db/client";
import { connect } from "@/lib/commands/databases.mjs";
import { sweep } from "@/lib/services/upkeep/sweep";
import { fillTeam } from "../helpers/filled-team";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

const { adminUrl, appUrl } = await testDatabase();
const admin = await connect(adminUrl);
const app = await connect(appUrl);
afterAll(async () => {
  await Promise.all([admin.end(), app.end()]);
  await closePool();
});
const SWEPT = ["sessions", "password_resets", "outbox", "idempotency_keys", "design_drafts"];

async function counts(): Promise<Record<string, number>> {
  const each = SWEPT.map((table) => `(select count(*)::int from ${table}) as ${table}`);
  return (await admin.query(`select ${each.join(", ")}`)).rows[0];
}

/** Each kind once on either side of its age. */
async function oldAndYoung(teamId: string, userId: string): Promise<void> {
  const hash = () => randomUUID().replaceAll("-", "").padEnd(64, "0");
  const session =
    "insert into sessions (user_id, expires_at, revoked_at) values ($1, now() + $2::interval, now() + $3::interval)";
  for (const [ends, revoked] of [
    ["-31 days", null],
    ["7 days", "-31 days"],
    ["-29 days", null],
    ["7 days", "-29 days"],
    ["7 days", null],
  ])
    await admin.query(session, [userId, ends, revoked]);
  const reset = `insert into password_resets (user_id, token_hash, created_at, expires_at)
    values ($1, $2, now() + $3::interval, now() + $3::interval + interval '1 hour')`;
  for (const age of ["-31 days", "-29 days", "-1 minute"]) await admin.query(reset, [userId, hash(), age]);
  const mail = `insert into outbox (recipient, subject, text, html, created_at, sent_at)
    values ('a@saltmarsh.example', 's', 't', 'h', now() + $1::interval, now() + $2::interval)`;
  for (const [made, sent] of [
    ["-60 days", "-31 days"],
    ["-31 days", null],
    ["-60 days", "-29 days"],
    ["-29 days", null],
  ])
    await admin.query(mail, [made, sent]);
  const key = `insert into idempotency_keys (team_id, user_id, route, key, body_hash, created_at)
    values ($1, $2, 'POST /plants', $3, 'h', now() + $4::interval)`;
  for (const age of ["-25 hours", "-23 hours"]) await admin.query(key, [teamId, userId, randomUUID(), age]);
  const draft = `insert into design_drafts (team_id, user_id, subject_id, plant_id, plant_revision_id, form, mark, updated_at)
    select team_id, $1, plant_id, plant_id, id, '{}', $2, now() + $3::interval from plant_revisions where team_id = $4`;
  await admin.query(draft, [userId, randomUUID(), "-91 days", teamId]);
  await admin.query(
    "update design_drafts set updated_at = now() - interval '89 days' where design_id is not null and user_id = $1",
    [userId],
  );
}

test("what is old enough goes, in every team, and everything younger stays", async () => {
  const young = await counts();
  for (const { teamId, userId } of [await fillTeam(admin), await fillTeam(admin)]) await oldAndYoung(teamId, userId);
  const before = await counts();
  expect(await sweep()).toEqual({ sessions: 4, passwordResets: 2, mails: 4, idempotencyKeys: 2, drafts: 2 });
  expect(await counts()).toEqual({
    sessions: before.sessions - 4,
    password_resets: before.password_resets - 2,
    outbox: before.outbox - 4,
    idempotency_keys: before.idempotency_keys - 2,
    design_drafts: before.design_drafts - 2,
  });
  expect(before).not.toEqual(young);
  expect(await sweep()).toEqual({ sessions: 0, passwordResets: 0, mails: 0, idempotencyKeys: 0, drafts: 0 });
});

test("more than one statement takes is taken by several", async () => {
  const { teamId, userId } = await newTeam();
  await admin.query(
    `insert into idempotency_keys (team_id, user_id, route, key, body_hash, created_at)
     select $1, $2, 'POST /plants', 'key-' || n, 'h', now() - interval '2 days' from generate_series(1, 2345) n`,
    [teamId, userId],
  );
  expect((await sweep()).idempotencyKeys).toBe(2345);
});

test("the serving role can remove nothing young, and nothing old outside a sweep, whatever it asks for", async () => {
  const { teamId, userId } = await fillTeam(admin);
  await oldAndYoung(teamId, userId);
  const removedBy = async (settings: Record<string, string>, table: string) => {
    await app.query("begin");
    for (const [name, value] of Object.entries(settings)) await app.query("select set_config($1, $2, true)", [name, value]);
    const { rowCount } = await app.query(`delete from ${table}`);
    await app.query("rollback");
    return rowCount;
  };
  const own = { "app.team_id": teamId, "app.user_id": userId };
  for (const table of SWEPT) {
    // A person's own keys end with the requests that made them, drafts with a save; everything else only in a sweep.
    const [withOwn, sweeping] = [await removedBy(own, table), await removedBy({ "app.sweeping": "on" }, table)];
    expect(withOwn, table).toBe({ idempotency_keys: 3, design_drafts: 2 }[table] ?? 0);
    expect(sweeping, table).toBe({ sessions: 2, password_resets: 1, outbox: 2, idempotency_keys: 1, design_drafts: 1 }[table]);
  }
});

test("a sweep sees what is due and nothing else of any team", async () => {
  const tables = ["users", "teams", "plants", "memberships", "audit_events"];
  const seen = await asVisitor((tx) => tx.execute(tables.map((table) => `select 1 from ${table}`).join(" union all ")), {
    sweeping: "on",
  });
  expect(seen.rowCount).toBe(0);
});
