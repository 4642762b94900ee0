import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import { type Asker, everyRoute, requestTo, type Sent, send } from "../helpers/every-route";
import { byWeights } from "../helpers/recipes";
import { type Ids, type Stock, stockedTeam } from "../helpers/stocked-team";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
const admin = (statement: string, values: unknown[] = []) => withClient(adminUrl, (client) => client.query(statement, values));
let ours: Stock;
let theirs: Stock;
beforeAll(async () => {
  [ours, theirs] = [await stockedTeam(adminUrl), await stockedTeam(adminUrl)];
});
beforeEach(() => admin("delete from rate_limits"));
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const askerOf = ({ ctx }: Stock): Asker => ({ ...ctx, email: `${ctx.userId}@saltmarsh.example` });
const served = (await everyRoute()).filter(({ address }) => address.startsWith("/api/v1/"));
const named = served.filter(({ address }) => /\{\w+\}/.test(address));
const lists = served.filter(({ method, address }) => method === "GET" && !address.includes("{") && !address.includes("openapi"));

const UUID = /[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}/g;
/** All that an answer tells, but for ids. */
async function told(response: Response) {
  const headers = [...response.headers].filter(([name]) => name !== "x-request-id");
  return { status: response.status, headers, body: (await response.text()).replace(UUID, "id") };
}
/** Everything theirs holds, so that nothing of it is touched or added to. */
async function stateOf({ ctx }: Stock): Promise<unknown> {
  const tables = ["plants", "plant_revisions", "designs", "design_revisions", "comparisons", "templates", "memberships"];
  const sums = tables.map(
    (table) => `(select md5(string_agg(t::text, '|' order by t::text)) from ${table} t where team_id = $1) ${table}`,
  );
  return (await admin(`select ${sums.join(", ")}`, [ctx.teamId])).rows[0];
}

/** Every way to put `foreign` ids into some of the places of an address, ours into the rest. */
function mixtures(own: Ids, foreign: Ids): Ids[] {
  const names = Object.keys(own);
  return Array.from({ length: 2 ** names.length - 1 }, (_, choice) =>
    Object.fromEntries(names.map((name, bit) => [name, (choice + 1) & (1 << bit) ? foreign[name] : own[name]])),
  );
}

describe("another team's ids in an address are answered like ids of nothing, where our own are answered", () => {
  test.each(named)("$name", async (route) => {
    const asker = askerOf(ours);
    const answered = async (ids?: Ids) => {
      const sent = await requestTo(route, ours, asker);
      return send(route, ours, ours.api.headers, ids ? { ...sent, ids } : sent);
    };
    const own = { ...ours.idsIn(route.address), ...(await requestTo(route, ours, asker)).ids };
    const foreign = { ...theirs.idsIn(route.address), ...(await requestTo(route, theirs, askerOf(theirs))).ids };
    const before = await stateOf(theirs);
    for (const ids of mixtures(own, foreign)) {
      const random = Object.fromEntries(Object.entries(ids).map(([name, id]) => [name, id === own[name] ? id : randomUUID()]));
      const [seen, absent] = [await told(await answered(ids)), await told(await answered(random))];
      expect(seen.status).toBe(404);
      expect(seen).toEqual(absent);
    }
    expect(await stateOf(theirs)).toEqual(before);
    expect((await answered()).status).toBeLessThan(300);
  });
});

describe("another team's ids in a body or a query are answered like ids of nothing, where our own are answered", () => {
  const recipe = byWeights();
  const name = "x";
  const cases: [string, string, (one: Stock) => Sent][] = [
    [
      "a plant revision to design on",
      "POST /api/v1/plants/{plantId}/designs",
      ({ ids }) => ({ body: { name, plantRevisionId: ids.revisionId, recipe } }),
    ],
    [
      "a plant revision to copy",
      "POST /api/v1/plants/{plantId}/duplicate",
      ({ ids }) => ({ body: { name, revisionId: ids.revisionId } }),
    ],
    [
      "a plant revision to compute",
      "POST /api/v1/computations",
      ({ ids }) => ({ body: { plant: { revisionId: ids.revisionId }, recipe } }),
    ],
    [
      "the first revision of a difference",
      "GET /api/v1/plants/{plantId}/difference",
      ({ ids }) => ({ query: `?from=${ids.revisionId}&to=${ours.ids.revisionId}` }),
    ],
    [
      "the second revision of a difference",
      "GET /api/v1/plants/{plantId}/difference",
      ({ ids }) => ({ query: `?from=${ours.ids.revisionId}&to=${ids.revisionId}` }),
    ],
    [
      "a compared plant",
      "POST /api/v1/comparisons",
      ({ ids }) => ({ body: { plantId: ids.plantId, title: name, designRevisionIds: ours.designRevisionIds } }),
    ],
    [
      "a compared revision",
      "POST /api/v1/comparisons",
      ({ ids }) => ({
        body: { plantId: ours.ids.plantId, title: name, designRevisionIds: [ours.designRevisionIds[1], ids.designRevisionId] },
      }),
    ],
    [
      "a revision side by side in a file",
      "GET /api/v1/plants/{plantId}/side-by-side",
      ({ ids }) => ({
        query: `?designs=${ours.designRevisionIds[1]},${ids.designRevisionId}`,
        ids: { plantId: ours.ids.plantId },
      }),
    ],
    ["a team to work in", "PUT /api/v1/account/team", ({ ctx }) => ({ body: { teamId: ctx.teamId } })],
  ];
  test.each(cases)("%s", async (_, wanted, make) => {
    const route = served.find((one) => one.name === wanted);
    if (!route) throw new Error(`there is no ${wanted}`);
    const answered = (one: Stock) => send(route, ours, ours.api.headers, make(one));
    const nothing = {
      ...theirs,
      ctx: { ...theirs.ctx, teamId: randomUUID() },
      ids: Object.fromEntries(Object.keys(theirs.ids).map((id) => [id, randomUUID()])),
    };
    const before = await stateOf(theirs);
    const [seen, absent] = [await told(await answered(theirs)), await told(await answered(nothing))];
    expect(seen.status).toBe(404);
    expect(seen).toEqual(absent);
    expect(await stateOf(theirs)).toEqual(before);
    expect((await answered(ours)).status).toBeLessThan(300);
  });

  test("a plant revision to carry a design over to", async () => {
    const path = `/api/v1/designs/${ours.ids.designId}`;
    const answered = async (plantRevisionId: string) => {
      const { version } = await ours.api.get<{ version: number }>(path);
      return ours.api.ask("POST", `${path}/revisions`, { body: { plantRevisionId, recipe }, version });
    };
    const [seen, absent] = [await told(await answered(theirs.ids.revisionId)), await told(await answered(randomUUID()))];
    expect(seen.status).toBe(404);
    expect(seen).toEqual(absent);
    expect((await answered(ours.ids.revisionId)).status).toBe(201);
  });

  test("a plant to list comparisons of", async () => {
    const count = async (plantId: string) =>
      (await ours.api.get<{ items: unknown[] }>(`/api/v1/comparisons?plantId=${plantId}`)).items.length;
    expect([await count(theirs.ids.plantId), await count(randomUUID())]).toEqual([0, 0]);
    expect(await count(ours.ids.plantId)).toBeGreaterThan(0);
  });
});

test.each(lists)("$name shows nothing of another team", async (route) => {
  const response = await send(route, ours, ours.api.headers, {});
  const text = await response.text();
  for (const id of [theirs.ctx.teamId, ...Object.values(theirs.ids), ...theirs.designRevisionIds]) expect(text).not.toContain(id);
});
