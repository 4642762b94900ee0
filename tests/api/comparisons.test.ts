import { randomUUID } from "node:crypto";
import { afterAll, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Comparison } from "@/lib/schemas/comparison";
import type { DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

async function plantWithTwo(api: Api) {
  const plant = await api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content: twoCarriages() });
  const revisions: string[] = [];
  for (const recipe of [byWeights(), byPoles()]) {
    const body = { name: recipe.method, plantRevisionId: plant.currentRevision.id, recipe };
    const made = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, body);
    revisions.push(made.currentRevision.id);
  }
  return { plantId: plant.id, revisions };
}
const listed = async (api: Api, query = "") =>
  (await api.get<{ items: Comparison[] }>(`/api/v1/comparisons${query}`)).items.map(({ title }) => title);

test("a comparison keeps its order, title and note, and leaves the lists when it is taken off them", async () => {
  const { ctx, api } = await member();
  const { plantId, revisions } = await plantWithTwo(api);
  const reviewer = (await member(ctx.teamId, "reviewer")).api;
  const sent = { plantId, title: "Soft or stiff", note: "For Monday", designRevisionIds: [...revisions].reverse() };
  const response = await reviewer.ask("POST", "/api/v1/comparisons", { body: sent });
  const saved: Comparison = await response.json();
  expect([response.status, response.headers.get("location")]).toEqual([201, `/api/v1/comparisons/${saved.id}`]);
  expect(saved).toMatchObject({ ...sent, version: 1, createdBy: "Test reviewer" });
  expect(await api.get(`/api/v1/comparisons/${saved.id}`)).toEqual(saved);
  expect([await listed(api), await listed(api, `?plantId=${plantId}`), await listed(api, `?plantId=${randomUUID()}`)]).toEqual([
    ["Soft or stiff"],
    ["Soft or stiff"],
    [],
  ]);
  const stale = await api.ask("DELETE", `/api/v1/comparisons/${saved.id}`, { version: 2 });
  expect(await problemIn(stale)).toMatchObject({ status: 412, given: 2, current: 1 });
  await api.remove(`/api/v1/comparisons/${saved.id}`, 1);
  expect(await listed(api)).toEqual([]);
  expect(await api.get(`/api/v1/comparisons/${saved.id}`)).toMatchObject({ title: "Soft or stiff", version: 2 });
});

test("only two to six different revisions of one plant of the team stand side by side", async () => {
  const { api } = await member();
  const { plantId, revisions } = await plantWithTwo(api);
  const other = await plantWithTwo(api);
  const foreign = await plantWithTwo((await member()).api);
  const refused = async (designRevisionIds: unknown, of = plantId) => {
    const body = { plantId: of, title: "x", designRevisionIds };
    const { status, code, errors } = await problemIn(await api.ask("POST", "/api/v1/comparisons", { body }));
    return [status, code, errors?.[0].pointer];
  };
  const invalid = [422, "invalid", "/designRevisionIds"];
  expect(await refused(revisions.slice(1))).toEqual(invalid);
  expect(await refused([])).toEqual(invalid);
  expect(await refused([revisions[0], revisions[0]])).toEqual(invalid);
  expect(await refused(Array.from({ length: 7 }, () => randomUUID()))).toEqual(invalid);
  expect(await refused([revisions[0], "no id"])).toEqual([422, "invalid", "/designRevisionIds/1"]);
  const absent = [404, "not-found", undefined];
  expect(await refused([revisions[0], randomUUID()])).toEqual(absent);
  expect(await refused([revisions[0], other.revisions[0]])).toEqual(absent);
  expect(await refused([revisions[0], foreign.revisions[0]])).toEqual(absent);
  expect(await refused(revisions, other.plantId)).toEqual(absent);
  expect(await refused(foreign.revisions, foreign.plantId)).toEqual(absent);
  expect(await listed(api)).toEqual([]);
});
