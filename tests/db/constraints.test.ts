import type pg from "pg";
import { describe, expect, test } from "vitest";
import { connect } from "@/lib/commands/databases.mjs";
import { EMPTY_MODEL, EMPTY_RECIPE, type FilledTeam, fillTeam } from "../helpers/filled-team";
import { testDatabase } from "../helpers/test-database";

const { appUrl, adminUrl } = await testDatabase();
const admin = await connect(adminUrl);
const app = await connect(appUrl);
const ours = await fillTeam(admin);
const theirs = await fillTeam(admin);

const NOT_FOUND_THERE = "23503";
const CHECK = "23514";
const NEVER_CHANGED = "55000";
const NO_RIGHT = "42501";

/** In a transaction of its own for `team`, rolled back. */
async function stateOf(client: pg.Client, statement: string, values: unknown[] = [], team: FilledTeam = ours): Promise<string> {
  await client.query("begin");
  await client.query("select set_config('app.team_id', $1, true), set_config('app.user_id', $2, true)", [
    team.teamId,
    team.userId,
  ]);
  try {
    await client.query(statement, values);
    return "done";
  } catch (error) {
    return error instanceof Error && "code" in error ? String(error.code) : "no code";
  } finally {
    await client.query("rollback");
  }
}

describe("a child never points at another team's parent, whoever writes it", () => {
  const crossed: [string, string, unknown[]][] = [
    [
      "a plant revision",
      "insert into plant_revisions (team_id, plant_id, number, content, model, created_by) values ($1, $2, 9, '{}', $4, $3)",
      [ours.teamId, theirs.plantId, ours.userId, EMPTY_MODEL],
    ],
    [
      "a design",
      "insert into designs (team_id, plant_id, name, created_by) values ($1, $2, 'x', $3)",
      [ours.teamId, theirs.plantId, ours.userId],
    ],
    [
      "a design revision's design",
      "insert into design_revisions (team_id, plant_id, design_id, number, plant_revision_id, recipe, method_version, created_by) values ($1, $2, $3, 9, $4, $6, '1', $5)",
      [ours.teamId, ours.plantId, theirs.designId, ours.revisionId, ours.userId, EMPTY_RECIPE],
    ],
    [
      "a design revision's plant revision",
      "insert into design_revisions (team_id, plant_id, design_id, number, plant_revision_id, recipe, method_version, created_by) values ($1, $2, $3, 9, $4, $6, '1', $5)",
      [ours.teamId, ours.plantId, ours.designId, theirs.revisionId, ours.userId, EMPTY_RECIPE],
    ],
    [
      "evidence",
      "insert into evidence (team_id, design_revision_id, part, state, content) values ($1, $2, 'poles', 'computed', '{}')",
      [ours.teamId, theirs.designRevisionId],
    ],
    [
      "a response",
      "insert into response_records (team_id, design_revision_id, position, kind, loop, source, amplitude, samples, step, values) values ($1, $2, 5, 'step', 'observer', 0, 1, 1, 0.1, '\\x0000000000000000')",
      [ours.teamId, theirs.designRevisionId],
    ],
    [
      "a comparison's plant",
      "insert into comparisons (team_id, plant_id, title, design_revision_ids, created_by) select $1, $2, 'x', design_revision_ids, $3 from comparisons where team_id = $1",
      [ours.teamId, theirs.plantId, ours.userId],
    ],
    [
      "a comparison's revisions",
      "insert into comparisons (team_id, plant_id, title, design_revision_ids, created_by) values ($1, $2, 'x', array[$3, $4]::uuid[], $5)",
      [ours.teamId, ours.plantId, ours.designRevisionId, theirs.designRevisionId, ours.userId],
    ],
    ["an author", "insert into plants (team_id, name, created_by) values ($1, 'x', $2)", [ours.teamId, theirs.userId]],
    [
      "a session's team",
      "insert into sessions (user_id, team_id, expires_at) values ($1, $2, now())",
      [ours.userId, theirs.teamId],
    ],
    [
      "an audit event's actor",
      "insert into audit_events (team_id, actor_id, kind, subject_type, request_id) values ($1, $2, 'plant.created', 'plant', 'r')",
      [ours.teamId, theirs.userId],
    ],
  ];
  test.each(crossed)("%s", async (_, statement, values) => {
    expect(await stateOf(admin, statement, values)).toBe(NOT_FOUND_THERE);
    expect(await stateOf(app, statement, values)).toBe(NOT_FOUND_THERE);
  });
});

test("a comparison holds two to six different revisions of one plant", async () => {
  const insert =
    "insert into comparisons (team_id, plant_id, title, design_revision_ids, created_by) values ($1, $2, 'x', $3, $4)";
  const { rows } = await admin.query<{ ids: string[] }>("select design_revision_ids as ids from comparisons where team_id = $1", [
    ours.teamId,
  ]);
  const [first, second] = rows[0].ids;
  const state = (ids: string[]) => stateOf(app, insert, [ours.teamId, ours.plantId, ids, ours.userId]);
  expect(await state([second, first])).toBe("done");
  expect(await state([first, first])).toBe(NOT_FOUND_THERE);
  expect(await state([first])).toBe(CHECK);
  expect(await state([])).toBe(CHECK);
});

describe("values that cannot be right are refused", () => {
  const record = (changes: Record<string, string>) => {
    const row = {
      position: "5",
      kind: "'step'",
      loop: "'observer'",
      source: "0",
      amplitude: "1",
      samples: "1",
      step: "0.1",
      values: "'\\x0000000000000000'",
      ...changes,
    };
    return `insert into response_records (team_id, design_revision_id, ${Object.keys(row).join(", ")}) values ('${ours.teamId}', '${ours.designRevisionId}', ${Object.values(row).join(", ")})`;
  };
  const wrong: [string, string][] = [
    ["an amplitude that is not a number", record({ amplitude: "'NaN'" })],
    ["an infinite amplitude", record({ amplitude: "'Infinity'" })],
    ["an infinite step", record({ step: "'-Infinity'" })],
    ["a step of zero", record({ step: "0" })],
    ["no samples", record({ samples: "0" })],
    ["half a number", record({ values: "'\\x00000000'" })],
    ["an unknown kind of response", record({ kind: "'guess'" })],
    [
      "an unknown state of evidence",
      `insert into evidence (team_id, design_revision_id, part, state, content) values ('${ours.teamId}', '${ours.designRevisionId}', 'poles', 'perhaps', '{}')`,
    ],
    [
      "an unknown role",
      `insert into memberships (team_id, user_id, role) values ('${ours.teamId}', '${theirs.userId}', 'owner')`,
    ],
    [
      "an address in capitals",
      `insert into users (id, email, name, password_hash) values ('${ours.userId}', 'Ann@Saltmarsh.example', 'Ann', 'x')`,
    ],
    ["a plant without a name", `insert into plants (team_id, name, created_by) values ('${ours.teamId}', '', '${ours.userId}')`],
    [
      "a reset link that lives longer than an hour",
      `insert into password_resets (user_id, token_hash, expires_at) values ('${ours.userId}', repeat('a', 64), now() + interval '61 minutes')`,
    ],
    [
      "a secret instead of its hash",
      `insert into access_tokens (team_id, user_id, name, token_hash, scope, expires_at) values ('${ours.teamId}', '${ours.userId}', 'x', 'gw_secret', 'read', now())`,
    ],
    [
      "a mail with a second header in its subject",
      `insert into outbox (team_id, recipient, subject, text, html) values ('${ours.teamId}', 'a@b.example', E'x\\r\\nBcc: c@d.example', 't', 'h')`,
    ],
  ];
  test("while the same row with right values is taken", async () => {
    expect(await stateOf(app, record({}))).toBe("done");
  });
  test.each(wrong)("%s", async (_, statement) => {
    expect(await stateOf(app, statement)).toBe(CHECK);
  });
  test("a NaN cannot be written into a document", async () => {
    expect(
      await stateOf(
        app,
        `insert into templates (team_id, name, content, created_by) values ('${ours.teamId}', 'x', '{"a": NaN}', '${ours.userId}')`,
      ),
    ).toBe("22P02");
  });
});

describe("what is stored once stays as it is", () => {
  test.each(["plant_revisions", "design_revisions", "evidence", "response_records", "audit_events"])("%s", async (table) => {
    const changes = [`update ${table} set id = id where team_id = $1`, `delete from ${table} where team_id = $1`];
    for (const change of changes) {
      expect(await stateOf(app, change, [ours.teamId]), change).toBe(NO_RIGHT);
      // Row security gives the owner no row to change; a superuser, whom it does not stop, meets the trigger.
      expect(await stateOf(admin, change, [ours.teamId]), change).toBe(NEVER_CHANGED);
    }
    expect(await stateOf(app, `truncate ${table} cascade`)).toBe(NO_RIGHT);
    expect(await stateOf(admin, `truncate ${table} cascade`)).toBe(NEVER_CHANGED);
  });

  test("two revisions never share a number", async () => {
    const again =
      "insert into plant_revisions (team_id, plant_id, number, content, model, created_by) values ($1, $2, 1, '{}', $4, $3)";
    expect(await stateOf(app, again, [ours.teamId, ours.plantId, ours.userId, EMPTY_MODEL])).toBe("23505");
  });
});

test("an address, an owner or a past is not what the serving role may change", async () => {
  const forbidden = [
    "update users set email = 'x@y.example'",
    "update plants set team_id = team_id",
    "update plants set created_by = created_by",
    "update sessions set expires_at = now() + interval '1 year'",
    "update access_tokens set scope = 'write'",
    "update invitations set role = 'lead'",
    "update outbox set html = ''",
    "delete from plants",
    "delete from users",
    "delete from memberships",
  ];
  for (const statement of forbidden) expect(await stateOf(app, statement), statement).toBe(NO_RIGHT);
});

test("every foreign key has an index that starts with its columns", async () => {
  const { rows } = await admin.query(`
    select conrelid::regclass::text as table, conname as name from pg_constraint c
    where contype = 'f' and connamespace = 'public'::regnamespace and not exists (
      select 1 from pg_index i where i.indrelid = c.conrelid
        and (select array_agg(k) from (select unnest(i.indkey::int2[]) limit cardinality(c.conkey)) as first(k)) @> c.conkey)`);
  expect(rows).toEqual([]);
});
