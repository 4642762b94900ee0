import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantRevisionEntry, PlantSummary } from "@/lib/schemas/plant";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const plantOf = (api: Api) => api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content: twoCarriages() });
const designOf = (api: Api, { id, currentRevision }: PlantSummary) =>
  api.post<DesignSummary>(`/api/v1/plants/${id}/designs`, {
    name: "Soft",
    plantRevisionId: currentRevision.id,
    recipe: byWeights(),
  });
const many = <T>(count: number, make: (index: number) => Promise<T>) =>
  Promise.all(Array.from({ length: count }, (_, index) => make(index)));

async function count(table: string, teamId: string): Promise<number> {
  const { rows } = await withClient(adminUrl, (client) =>
    client.query(`select count(*)::int as count from ${table} where team_id = $1`, [teamId]),
  );
  return rows[0].count;
}

/** One of them was taken; each of the others was told the version that stands now. */
async function expectOneWinner(responses: readonly Response[], status: number, version: number) {
  const winners = responses.filter((response) => response.status === status);
  expect(winners).toHaveLength(1);
  expect(winners[0].headers.get("etag")).toBe(`"${version}"`);
  for (const response of responses) {
    if (response === winners[0]) continue;
    expect(await problemIn(response)).toMatchObject({ status: 412, given: version - 1, current: version });
  }
}

test("of twenty revisions of one plant version one is stored and nineteen are answered 412", async () => {
  const { ctx, api } = await member();
  const plant = await plantOf(api);
  const path = `/api/v1/plants/${plant.id}/revisions`;
  const content = twoCarriages();
  await expectOneWinner(await many(20, (i) => api.ask("POST", path, { body: { content, note: `${i}` }, version: 1 })), 201, 2);
  const { items } = await api.get<{ items: PlantRevisionEntry[] }>(path);
  expect(items.map(({ number }) => number)).toEqual([2, 1]);
  expect(await count("audit_events", ctx.teamId)).toBe(2);
});

test("of twenty changes of one design version, of every kind at once, one is stored and nineteen are answered 412", async () => {
  const { ctx, api } = await member();
  const { id } = await designOf(api, await plantOf(api));
  const path = `/api/v1/designs/${id}`;
  const change = (index: number) =>
    index % 2
      ? api.ask("PATCH", path, { body: { name: `Name ${index}` }, version: 1 })
      : api.ask("POST", `${path}/archive`, { body: { archived: true }, version: 1 });
  await expectOneWinner(await many(20, change), 200, 2);
  expect(await count("audit_events", ctx.teamId)).toBe(3);
});

test("of ten computed revisions of one design version one is stored with its evidence", async () => {
  const { ctx, api } = await member();
  const plant = await plantOf(api);
  const { id } = await designOf(api, plant);
  const evidence = await count("evidence", ctx.teamId);
  const body = { plantRevisionId: plant.currentRevision.id, recipe: byWeights({ degreeOfStability: 2 }) };
  const path = `/api/v1/designs/${id}/revisions`;
  await expectOneWinner(await many(10, () => api.ask("POST", path, { body, version: 1 })), 201, 2);
  expect([await count("design_revisions", ctx.teamId), await count("evidence", ctx.teamId)]).toEqual([2, 2 * evidence]);
});

test("of twenty people who take one comparison off the lists one does", async () => {
  const { ctx, api } = await member();
  const plant = await plantOf(api);
  const [one, two] = [await designOf(api, plant), await designOf(api, plant)];
  const designRevisionIds = [one.currentRevision.id, two.currentRevision.id];
  const { id } = await api.post<{ id: string }>("/api/v1/comparisons", { plantId: plant.id, title: "Both", designRevisionIds });
  await expectOneWinner(await many(20, () => api.ask("DELETE", `/api/v1/comparisons/${id}`, { version: 1 })), 200, 2);
  expect(await count("comparisons", ctx.teamId)).toBe(1);
});

test("ten equal creates of a design at once are solved once, stored once and answered alike", async () => {
  const { ctx, api } = await member();
  const plant = await plantOf(api);
  const body = { name: "Soft", plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
  const headers = { "idempotency-key": randomUUID() };
  const responses = await many(10, () => api.ask("POST", `/api/v1/plants/${plant.id}/designs`, { body, headers }));
  expect(responses.map(({ status }) => status)).toEqual(Array.from({ length: 10 }, () => 201));
  expect(new Set(await Promise.all(responses.map((response) => response.text()))).size).toBe(1);
  expect([await count("designs", ctx.teamId), await count("evidence", ctx.teamId)]).toEqual([1, 4]);
});

test("twenty people who save plants of their own at once all get one each", async () => {
  const { ctx, api } = await member();
  const made = await many(20, (index) =>
    api.post<PlantSummary>("/api/v1/plants", { name: `Plant ${index}`, content: twoCarriages() }),
  );
  expect(new Set(made.map(({ id }) => id)).size).toBe(20);
  expect([await count("plants", ctx.teamId), await count("plant_revisions", ctx.teamId)]).toEqual([20, 20]);
});
