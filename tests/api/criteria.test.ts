import { randomUUID } from "node:crypto";
import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Criteria } from "@/lib/schemas/criteria";
import type { Computation, DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { Plant, PlantSummary } from "@/lib/schemas/plant";
import { listAuditEvents } from "@/lib/services/team/list-audit-events";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const settling = { kind: "settling", signal: null, limit: 5 } as const;
const overshoot = { kind: "overshoot", signal: "enc1", limit: 0 } as const;
const criteria: Criteria = [settling, overshoot, { kind: "effort", signal: "F1", limit: 80 }];

const create = (api: Api, name = "Gantry") => api.post<Plant>("/api/v1/plants", { name, content: twoCarriages() });
const put = (api: Api, { id }: Pick<Plant, "id">, body: unknown, version = 1) =>
  api.ask("PUT", `/api/v1/plants/${id}/criteria`, { body, version });

describe("criteria of a plant", () => {
  test("are none at first, and are kept in their order with a version and an event of their own", async () => {
    const { ctx, api } = await member();
    const plant = await create(api);
    expect(plant.criteria).toEqual([]);
    const response = await put(api, plant, { criteria });
    const saved: Plant = await response.json();
    expect([response.status, response.headers.get("etag")]).toEqual([200, '"2"']);
    expect(saved).toMatchObject({ version: 2, currentRevision: plant.currentRevision, criteria });
    expect(await api.get(`/api/v1/plants/${plant.id}`)).toEqual(saved);
    const { items } = await listAuditEvents(ctx, { limit: 1 });
    expect(items[0]).toMatchObject({ kind: "plant.criteria-set", subjectId: plant.id, revision: 1 });
    expect((await api.put<Plant>(`/api/v1/plants/${plant.id}/criteria`, { criteria: [] }, 2)).criteria).toEqual([]);
  });

  test("stay through a revision, a new name and the archive, go with a copy, and are left out of lists", async () => {
    const { api } = await member();
    const { id } = await create(api);
    const path = `/api/v1/plants/${id}`;
    await api.put(`${path}/criteria`, { criteria }, 1);
    const kept = [
      await api.post<Plant>(`${path}/revisions`, { content: twoCarriages({ source: "again" }) }, 2),
      await api.patch<Plant>(path, { name: "Renamed" }, 3),
      await api.post<Plant>(`${path}/archive`, { archived: true }, 4),
      await api.post<Plant>(`${path}/duplicate`, { name: "Copy" }),
    ];
    for (const plant of kept) expect(plant.criteria).toEqual(criteria);
    const { items } = await api.get<{ items: PlantSummary[] }>("/api/v1/plants?archived=all");
    expect(items).toHaveLength(2);
    for (const item of items) expect(item).not.toHaveProperty("criteria");
  });

  test("from a version that is no longer stored, or from none, are refused", async () => {
    const { api } = await member();
    const plant = await create(api);
    await api.patch(`/api/v1/plants/${plant.id}`, { name: "Renamed" }, 1);
    expect(await problemIn(await put(api, plant, { criteria }))).toMatchObject({
      status: 412,
      code: "stale-version",
      current: 2,
    });
    const bare = await api.ask("PUT", `/api/v1/plants/${plant.id}/criteria`, { body: { criteria } });
    expect(bare.status).toBe(428);
    expect((await api.get<Plant>(`/api/v1/plants/${plant.id}`)).criteria).toEqual([]);
  });

  test("are read and not set by a reviewer, and another team's plant is not there", async () => {
    const { ctx, api } = await member();
    const plant = await create(api);
    await api.put(`/api/v1/plants/${plant.id}/criteria`, { criteria }, 1);
    const reviewer = (await member(ctx.teamId, "reviewer")).api;
    expect((await put(reviewer, plant, { criteria: [] }, 2)).status).toBe(403);
    expect((await reviewer.get<Plant>(`/api/v1/plants/${plant.id}`)).criteria).toEqual(criteria);
    const stranger = (await member()).api;
    const [theirs, nobodys] = [
      await put(stranger, plant, { criteria: [] }, 2),
      await put(stranger, { id: randomUUID() }, { criteria: [] }, 2),
    ];
    expect([theirs.status, nobodys.status]).toEqual([404, 404]);
  });
});

test("criteria that cannot be judged are refused at their own field", async () => {
  const { api } = await member();
  const plant = await create(api);
  const refused = async (sent: readonly unknown[]) => {
    const problem = await problemIn(await put(api, plant, { criteria: sent }));
    expect(problem.status).toBe(422);
    return problem.errors?.map(({ pointer }) => pointer);
  };
  expect(await refused([settling, { ...settling, limit: 0 }])).toEqual(["/criteria/1/limit", "/criteria/1/signal"]);
  expect(await refused([{ ...overshoot, limit: -1 }])).toEqual(["/criteria/0/limit"]);
  expect(await refused([overshoot, settling, { ...overshoot, limit: 3 }])).toEqual(["/criteria/2/signal"]);
  expect(await refused([{ ...settling, signal: "" }])).toEqual(["/criteria/0/signal"]);
  expect(await refused([{ ...settling, limit: 1e10 }])).toEqual(["/criteria/0/limit"]);
  expect(await refused([{ ...settling, kind: "margin" }])).toEqual(["/criteria/0/kind"]);
  expect(await refused([{ ...settling, note: "x" }])).toHaveLength(1);
  const many = Array.from({ length: 25 }, (_, k) => ({ ...settling, signal: `s${k}` }));
  expect(await refused(many)).toEqual(["/criteria"]);
  expect((await put(api, plant, { criteria: many.slice(0, 24) })).status).toBe(200);
});

describe("verdicts", () => {
  test("of a stored design are by the plant's present criteria, with the numbers of its evidence", async () => {
    const { ctx, api } = await member();
    const plant = await create(api);
    const body = { name: "First", plantRevisionId: plant.currentRevision.id, recipe: byWeights() };
    const design = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, body);
    const path = `/api/v1/design-revisions/${design.currentRevision.id}`;
    const before = await api.get<DesignRevision>(path);
    expect(before.acceptance).toEqual({ judgedBy: "plant", met: 0, of: 0, verdicts: [] });
    const worst = design.summary?.worstSettling ?? Number.NaN;
    const sent: Criteria = [
      { ...settling, limit: worst },
      { kind: "settling", signal: "enc9", limit: 5 },
      { kind: "effort", signal: null, limit: 1e-6 },
    ];
    await api.put(`/api/v1/plants/${plant.id}/criteria`, { criteria: sent }, 1);
    const { acceptance } = await api.get<DesignRevision>(path);
    expect(acceptance).toMatchObject({ judgedBy: "plant", met: 1, of: 3 });
    expect(acceptance.verdicts.map(({ criterion }) => criterion)).toEqual(sent);
    expect(acceptance.verdicts[0]).toMatchObject({ value: worst, met: true, reason: null });
    expect(acceptance.verdicts[0].sentence).toMatch(/^Met: worst settling to 2 % is .+ s, at most .+ s is asked\.$/);
    expect(acceptance.verdicts[1]).toMatchObject({ value: null, met: false, reason: "no-signal" });
    const share = Math.max(...(design.summary?.peakEffort ?? []).map(({ overLimit }) => overLimit ?? 0));
    expect(acceptance.verdicts[2]).toMatchObject({ value: 100 * share, met: false });
    await api.put(`/api/v1/plants/${plant.id}/criteria`, { criteria: [{ ...settling, limit: worst / 2 }] }, 2);
    const reviewer = (await member(ctx.teamId, "reviewer")).api;
    expect((await reviewer.get<DesignRevision>(path)).acceptance).toMatchObject({ met: 0, of: 1 });
  });

  test("of a computation are by the criteria sent along, else by the stored plant's, else there are none", async () => {
    const { api } = await member();
    const plant = await create(api);
    await api.put(`/api/v1/plants/${plant.id}/criteria`, { criteria }, 1);
    const compute = async (body: object) =>
      (await api.post<Computation>("/api/v1/computations", { recipe: byWeights(), ...body })).acceptance;
    const stored = { plant: { revisionId: plant.currentRevision.id } };
    expect(await compute(stored)).toMatchObject({ judgedBy: "plant", of: 3 });
    expect(await compute({ ...stored, criteria: [settling] })).toMatchObject({ judgedBy: "request", of: 1 });
    expect(await compute({ ...stored, criteria: [] })).toMatchObject({ judgedBy: "request", of: 0 });
    expect(await compute({ plant: { content: twoCarriages() } })).toMatchObject({ of: 0, verdicts: [] });
    const wrong = await api.ask("POST", "/api/v1/computations", {
      body: { recipe: byWeights(), ...stored, criteria: [{ ...settling, limit: -1 }] },
    });
    expect((await problemIn(wrong)).errors?.map(({ pointer }) => pointer)).toContain("/criteria/0/limit");
  });
});
