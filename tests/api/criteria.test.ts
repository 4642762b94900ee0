import { randomUUID } from "node:crypto";
import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Criteria } from "@/lib/schemas/criteria";
import type { Plant, PlantSummary } from "@/lib/schemas/plant";
import { listAuditEvents } from "@/lib/services/team/list-audit-events";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
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
