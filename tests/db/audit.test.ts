import { afterAll, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import { createPlant } from "@/lib/services/plants/create";
import { renamePlant } from "@/lib/services/plants/rename";
import { listAuditEvents } from "@/lib/services/team/list-audit-events";
import { removeMember } from "@/lib/services/team/members";
import { renameTeam } from "@/lib/services/team/teams";
import { memberOf, newTeam, refusalOf } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { testDatabase } from "../helpers/test-database";

const { adminUrl, appUrl } = await testDatabase();
afterAll(closePool);

test("an event says who did what to what, when and in which request, to everybody in the team", async () => {
  const lead = await newTeam();
  await renameTeam({ ...lead, requestId: "request-4711" }, { name: "Renamed" });
  const reviewer = await memberOf(lead.teamId, "reviewer");
  const { items, nextCursor } = await listAuditEvents(reviewer, { limit: 50 });
  expect(nextCursor).toBeNull();
  expect(items).toEqual([
    {
      id: expect.any(String),
      at: expect.stringMatching(/^\d{4}-\d\d-\d\dT[\d:.]+Z$/),
      actor: "Test Lead",
      kind: "team.renamed",
      subjectType: "team",
      subjectId: lead.teamId,
      subjectName: null,
      plantId: null,
      revision: null,
      requestId: "request-4711",
      data: { name: "Renamed" },
    },
  ]);
  expect(Math.abs(Date.now() - Date.parse(items[0].at))).toBeLessThan(60_000);
});

test("an event names its subject as it is called today, and the plant to go to", async () => {
  const lead = await newTeam();
  const plant = await createPlant(lead, { name: "Two carriages", content: twoCarriages(), note: "" });
  const { name } = await renamePlant(lead, plant.id, plant.version, "Two carriages, stiff");
  const engineer = await memberOf(lead.teamId, "engineer");
  await removeMember(lead, engineer.userId);
  const { items } = await listAuditEvents(lead, { limit: 50 });
  expect(items.map(({ kind, subjectName, plantId }) => ({ kind, subjectName, plantId }))).toEqual([
    { kind: "member.removed", subjectName: "Test engineer", plantId: null },
    { kind: "plant.renamed", subjectName: name, plantId: plant.id },
    { kind: "plant.created", subjectName: name, plantId: plant.id },
  ]);
});

test("what a program did names its token", async () => {
  const lead = await newTeam();
  const { id } = await createAccessToken(lead, { name: "Script", scope: "write", expiresInDays: 1 });
  const { recordEvent } = await import("@/lib/services/audit");
  const { inTransaction } = await import("@/db/client");
  await inTransaction(lead, (tx) => recordEvent(tx, { ...lead, tokenId: id }, "plant.created", { type: "plant", id: null }));
  const { items } = await listAuditEvents(lead, { limit: 1 });
  expect(items[0].data).toEqual({ tokenId: id });
});

test("pages follow each other without a gap or a double, also within one millisecond", async () => {
  const lead = await newTeam();
  await withClient(adminUrl, (client) =>
    client.query(
      `insert into audit_events (team_id, actor_id, kind, subject_type, request_id, at)
       select $1, $2, 'plant.created', 'plant', 'r' || n, now() + (n / 10) * interval '1 microsecond' from generate_series(1, 95) n`,
      [lead.teamId, lead.userId],
    ),
  );
  const seen: string[] = [];
  let cursor: string | undefined;
  for (let pages = 0; pages < 20; pages++) {
    const { items, nextCursor } = await listAuditEvents(lead, { limit: 10, cursor });
    seen.push(...items.map(({ requestId }) => requestId));
    if (!nextCursor) break;
    cursor = nextCursor;
  }
  expect(seen).toHaveLength(95);
  expect(new Set(seen).size).toBe(95);
  expect(await refusalOf(Promise.resolve().then(() => listAuditEvents(lead, { limit: 10, cursor: "nonsense" })))).toMatchObject({
    code: "invalid",
  });
});

test("another team's events are not there", async () => {
  const [one, other] = [await newTeam(), await newTeam()];
  await renameTeam(other, { name: "Secret name" });
  expect((await listAuditEvents(one, { limit: 50 })).items).toEqual([]);
});

test("the serving role writes and reads events, and neither changes nor removes one", async () => {
  const lead = await newTeam();
  await renameTeam(lead, { name: "Once" });
  const attempt = (statement: string) =>
    withClient(appUrl, async (client) => {
      await client.query("begin");
      await client.query("select set_config('app.team_id', $1, true)", [lead.teamId]);
      return client.query(statement).then(
        () => "done",
        (error: { code: string }) => error.code,
      );
    });
  expect(await attempt("select * from audit_events")).toBe("done");
  for (const statement of ["update audit_events set kind = 'a.b'", "delete from audit_events", "truncate audit_events"]) {
    expect(await attempt(statement), statement).toBe("42501");
  }
});
