import { randomUUID } from "node:crypto";
import pg from "pg";
import { afterAll, beforeAll, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import type { Context } from "@/lib/services/context";
import { readDesignRevision } from "@/lib/services/designs/read-revision";
import { readDesignRevisions } from "@/lib/services/designs/read-revisions";
import { readPlant } from "@/lib/services/plants/read";
import { type Api, member } from "../helpers/api";
import { refusalOf } from "../helpers/people";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const TRANSACTION = /^\s*(begin|commit|rollback|savepoint|release|select set_config)/i;

/** What this process sends to the database while `act` runs, but for the frames of transactions. */
async function statementsOf(act: () => Promise<unknown>): Promise<string[]> {
  const prototype = pg.Client.prototype as unknown as { query: (...args: unknown[]) => unknown };
  const original = prototype.query;
  const sent: string[] = [];
  prototype.query = function (this: unknown, ...args: unknown[]) {
    const [first] = args;
    const text = typeof first === "string" ? first : String((first as { text?: string }).text);
    if (!TRANSACTION.test(text)) sent.push(text);
    return original.apply(this, args);
  };
  try {
    await act();
    return sent;
  } finally {
    prototype.query = original;
  }
}

let ctx: Context;
let api: Api;
let paths: string[];
let plantId: string;
let revisions: string[];
beforeAll(async () => {
  ({ ctx, api } = await member());
  const plants: PlantSummary[] = [];
  for (let index = 0; index < 12; index++) {
    plants.push(await api.post<PlantSummary>("/api/v1/plants", { name: `Plant ${index}`, content: twoCarriages() }));
  }
  const [{ currentRevision }] = plants;
  plantId = plants[0].id;
  const made: DesignSummary[] = [];
  for (let index = 0; index < 6; index++) {
    const recipe = byWeights({ observer: observers.noise });
    const body = { name: `Design ${index}`, plantRevisionId: currentRevision.id, recipe };
    made.push(await api.post<DesignSummary>(`/api/v1/plants/${plantId}/designs`, body));
  }
  revisions = made.map((one) => one.currentRevision.id);
  const compared = { plantId, title: "Both", designRevisionIds: revisions };
  const { id: comparisonId } = await api.post<{ id: string }>("/api/v1/comparisons", compared);
  const mass = { name: "m", unit: "kg", lowest: 5, highest: 40, suggested: 12, help: "" };
  const content = { plant: twoCarriages(), recipe: byWeights(), openParameters: [mass] };
  const { id: templateId } = await api.post<{ id: string }>("/api/v1/templates", { name: "Two carriages", content });
  await api.post(`/api/v1/plants/${plantId}/revisions`, { content: twoCarriages({ source: "again" }) }, 1);
  const plant = await api.get<PlantSummary>(`/api/v1/plants/${plantId}`);
  paths = [
    "/plants",
    "/plants?search=plant&sort=name",
    `/plants/${plantId}`,
    `/plants/${plantId}/revisions`,
    `/plants/${plantId}/revisions/${currentRevision.id}`,
    `/plants/${plantId}/difference?from=${currentRevision.id}&to=${plant.currentRevision.id}`,
    `/plants/${plantId}/designs`,
    `/designs/${made[0].id}`,
    `/designs/${made[0].id}/revisions`,
    `/design-revisions/${revisions[0]}`,
    `/design-revisions/${revisions[0]}/responses`,
    `/design-revisions/${revisions[0]}/gains`,
    `/plants/${plantId}/side-by-side?designs=${revisions.join(",")}`,
    `/plants/${plantId}/drafts/${made[0].id}`,
    "/comparisons",
    `/comparisons/${comparisonId}`,
    "/templates",
    `/templates/${templateId}`,
    "/team",
    "/team/members",
    "/team/audit",
    "/team/invitations",
    "/account",
    "/account/tokens",
  ];
});

test("a read of a list or of one thing sends at most five statements, who asks and what it costs included", async () => {
  for (const path of paths) {
    const sent = await statementsOf(async () => {
      const response = await api.ask("GET", `/api/v1${path}`);
      expect([path, response.status]).toEqual([path, 200]);
    });
    expect(sent.length, `${path}:\n${sent.join("\n")}`).toBeLessThanOrEqual(5);
    expect(sent.length, path).toBeGreaterThanOrEqual(3);
  }
});

test("keeping a draft, again and again, sends at most five statements", async () => {
  const path = `/api/v1/plants/${plantId}/drafts/${plantId}`;
  const { currentRevision } = await api.get<PlantSummary>(`/api/v1/plants/${plantId}`);
  let replaces: string[] = [];
  for (const form of [{ step: 1 }, { step: 2 }]) {
    const body = { mark: randomUUID(), replaces, plantRevisionId: currentRevision.id, base: null, form };
    const sent = await statementsOf(() => api.put(path, body));
    expect(sent.length, sent.join("\n")).toBeLessThanOrEqual(5);
    replaces = [body.mark];
  }
});

test("six designs side by side are read with as few statements as one, as they are each for itself", async () => {
  const asked = revisions.toReversed();
  let read: DesignRevision[] = [];
  const sent = await statementsOf(async () => {
    await readPlant(ctx, plantId);
    read = await readDesignRevisions(ctx, plantId, asked);
  });
  expect(sent.length, sent.join("\n")).toBe(3);
  expect(read).toEqual(await Promise.all(asked.map((id) => readDesignRevision(ctx, id))));
});

test("designs side by side are all of the plant and the team that ask, at most six, or none are read", async () => {
  const refused = (who: Context, of: string, ids: string[]) => refusalOf(readDesignRevisions(who, of, ids));
  const [{ ctx: stranger }, other] = [await member(), await api.get<{ items: PlantSummary[] }>("/api/v1/plants?search=11")];
  expect(await readDesignRevisions(ctx, plantId, [])).toEqual([]);
  expect(await refused(stranger, plantId, revisions)).toMatchObject({ code: "not-found" });
  expect(await refused(ctx, other.items[0].id, revisions)).toMatchObject({ code: "not-found" });
  expect(await refused(ctx, plantId, [revisions[0], randomUUID()])).toMatchObject({ code: "not-found" });
  expect(await refused(ctx, plantId, [...revisions, revisions[0]])).toMatchObject({ code: "invalid" });
});

test("a reply of a list or of one thing stays below one megabyte", async () => {
  for (const path of paths) {
    const text = await (await api.ask("GET", `/api/v1${path}`)).text();
    expect(text.length, path).toBeLessThan(1_000_000);
  }
});
