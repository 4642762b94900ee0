import { randomUUID } from "node:crypto";
import { afterAll, describe, expect, test } from "vitest";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignSummary } from "@/lib/schemas/design";
import type { ChecksReply } from "@/lib/schemas/evidence";
import type { PlantDifference, PlantRevision, PlantSummary } from "@/lib/schemas/plant";
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

const create = (api: Api, name = "Gantry", content = twoCarriages()) =>
  api.post<PlantSummary>("/api/v1/plants", { name, content, note: "as measured" });
const newest = (api: Api, { id, currentRevision }: PlantSummary) =>
  api.get<PlantRevision>(`/api/v1/plants/${id}/revisions/${currentRevision.id}`);
const heavier = twoCarriages({
  parameters: twoCarriages().parameters.map((one) => (one.name === "m" ? { ...one, expression: "15" } : one)),
});

describe("a new plant", () => {
  test("is kept as it was typed, with the doubles that it was evaluated to", async () => {
    const { api } = await member();
    const content = twoCarriages({ source: "Drawing 4711, sheet 2", operatingPoint: null });
    const response = await api.ask("POST", "/api/v1/plants", { body: { name: "  Gantry ", content } });
    const plant: PlantSummary = await response.json();
    expect([response.status, response.headers.get("etag")]).toEqual([201, '"1"']);
    expect(response.headers.get("location")).toBe(`/api/v1/plants/${plant.id}`);
    expect(plant).toMatchObject({ name: "Gantry", version: 1, order: 4, inputCount: 2, outputCount: 2, designCount: 0 });
    expect(plant).toMatchObject({ axes: content.axes, timeBase: { kind: "continuous" }, archivedAt: null });
    expect(await api.get(`/api/v1/plants/${plant.id}`)).toEqual(plant);
    const revision = await newest(api, plant);
    expect(revision).toMatchObject({ number: 1, note: "", createdBy: "Test Lead", plantName: "Gantry" });
    expect(revision.content).toEqual(content);
    expect(revision.model).toEqual(JSON.parse(JSON.stringify(evaluatePlant(content).model)));
    expect(revision.model.A[2][0]).toBe(-(12 * (2 * Math.PI * 3) ** 2) / 12);
  });

  test("is refused with a pointer to each field that needs a change, and nothing is stored", async () => {
    const { api } = await member();
    const typed = twoCarriages();
    const content = twoCarriages({
      A: [["0", "0", "1", "0"], ["0", "0", "0"], ["-k/mass", "k/m", "2k", "0"], typed.A[3]],
      states: typed.states.map((state, index) => (index === 1 ? { ...state, name: "x1", unit: "" } : state)),
    });
    const refusal = await problemIn(await api.ask("POST", "/api/v1/plants", { body: { name: "Gantry", content } }));
    expect(refusal).toMatchObject({ status: 422, code: "invalid" });
    expect(refusal.errors).toEqual(
      expect.arrayContaining([
        { pointer: "/content/A/2/0", detail: expect.stringContaining('"mass"') },
        { pointer: "/content/A/2/2", detail: expect.stringContaining("*") },
        { pointer: "/content/A/1", detail: "Row 2 of A needs 4 entries; it has 3" },
        { pointer: "/content/states/1/name", detail: '"x1" already names state 1' },
        { pointer: "/content/states/1/unit", detail: expect.stringContaining("needs a unit") },
      ]),
    );
    expect(await api.get("/api/v1/plants?archived=all")).toEqual({ items: [], nextCursor: null });
  });

  test("of far more formulas than the pages' own thread takes on is evaluated to the same doubles", async () => {
    const { api } = await member();
    const states = Array.from({ length: 30 }, (_, index) => ({ name: `x${index}`, unit: "m", axis: null, scale: null }));
    const formula = (i: number, j: number) => `${"k/m - k/m + ".repeat(9)}${i}/(${j} + 1)`;
    const matrix = (rows: number, columns: number) =>
      Array.from({ length: rows }, (_, i) => Array.from({ length: columns }, (_, j) => formula(i, j)));
    const content = twoCarriages({ states, A: matrix(30, 30), B: matrix(30, 2), C: matrix(2, 30) });
    const plant = await create(api, "Large", content);
    expect((await newest(api, plant)).model).toEqual(JSON.parse(JSON.stringify(evaluatePlant(content).model)));
  });

  test("of thousands of wrong entries tells fifty, in a small reply", async () => {
    const { api } = await member();
    const signal = (_: unknown, index: number) => ({ name: `x${index}`, unit: "m", axis: null, scale: null });
    const wrong = (rows: number, columns: number) => Array.from({ length: rows }, () => new Array(columns).fill("((1)+oops"));
    const states = Array.from({ length: 60 }, signal);
    const content = twoCarriages({ states, A: wrong(60, 60), B: wrong(60, 2), C: wrong(2, 60) });
    const response = await api.ask("POST", "/api/v1/plants", { body: { name: "Wrong", content } });
    const text = await response.text();
    expect([response.status, JSON.parse(text).errors.length]).toEqual([422, 50]);
    expect(text.length).toBeLessThan(20_000);
  });
});

test("checks of a plant that is not saved are those of the saved one, in words with signal names", async () => {
  const { api } = await member();
  const stuck = twoCarriages({
    B: twoCarriages().B.map((row, index) => (index === 3 ? ["0", "0"] : row)),
    C: [
      ["0", "0", "0", "0"],
      ["0", "1", "0", "0"],
    ],
  });
  const unsaved = await api.post<ChecksReply>("/api/v1/checks", { content: stuck });
  const plant = await create(api, "Stuck", stuck);
  const saved = await api.get<ChecksReply>(`/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}/checks`);
  expect(saved).toEqual(unsaved);
  expect(saved.controllability).toMatchObject({ state: "computed", value: { rank: 4, full: 4 } });
  expect(saved.findings.length).toBeGreaterThan(2);
  expect(saved.findings.map(({ sentence }) => sentence).join(" ")).toMatch(/\b(x1|x2|v1|v2|F2|enc1)\b/);
});

describe("revising a plant", () => {
  test("adds a revision, bumps the version and leaves the older one as it was", async () => {
    const { api } = await member();
    const plant = await create(api);
    const before = await newest(api, plant);
    const revised = await api.post<PlantSummary>(
      `/api/v1/plants/${plant.id}/revisions`,
      { content: heavier, note: "weighed" },
      1,
    );
    expect(revised).toMatchObject({ id: plant.id, version: 2, currentRevision: { number: 2 } });
    expect((await newest(api, revised)).model.B[2][0]).toBe(1 / 15);
    expect(await newest(api, plant)).toEqual(before);
    const { items } = await api.get<{ items: PlantRevision[] }>(`/api/v1/plants/${plant.id}/revisions`);
    expect(items.map(({ number, note }) => [number, note])).toEqual([
      [2, "weighed"],
      [1, "as measured"],
    ]);
  });

  test("from a version that is no longer stored is refused with the current one, and both people's work can be kept", async () => {
    const { ctx, api } = await member();
    const colleague = (await member(ctx.teamId, "engineer")).api;
    const plant = await create(api);
    const path = `/api/v1/plants/${plant.id}/revisions`;
    await colleague.post(path, { content: heavier, note: "theirs" }, 1);
    const mine = { content: twoCarriages({ source: "mine" }), note: "mine" };
    const refused = await api.ask("POST", path, { body: mine, version: 1 });
    expect(refused.headers.get("etag")).toBe('"2"');
    expect(await problemIn(refused)).toMatchObject({ status: 412, code: "stale-version", given: 1, current: 2 });
    const now = await api.get<PlantSummary>(`/api/v1/plants/${plant.id}`);
    expect((await newest(api, now)).note).toBe("theirs");
    expect(await api.post(path, mine, now.version)).toMatchObject({ version: 3, currentRevision: { number: 3 } });
    const { items } = await api.get<{ items: PlantRevision[] }>(path);
    expect(items.map(({ note }) => note)).toEqual(["mine", "theirs", "as measured"]);
  });

  test("tells what differs place by place, and which designs it outdates until they are carried over", async () => {
    const { api } = await member();
    const plant = await create(api);
    const first = plant.currentRevision.id;
    const design = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, {
      name: "Soft",
      plantRevisionId: first,
      recipe: byWeights(),
    });
    expect(design.outdated).toBe(false);
    const changed = { ...heavier, A: heavier.A.map((row, i) => (i === 3 ? ["k/m", "-k/m", "0", "-0.5"] : row)) };
    const revised = await api.post<PlantSummary>(`/api/v1/plants/${plant.id}/revisions`, { content: changed }, 1);
    const second = revised.currentRevision.id;
    const differ = (from: string, to: string) =>
      api.get<PlantDifference>(`/api/v1/plants/${plant.id}/difference?from=${from}&to=${to}`);
    const { from, to, changes, outdates } = await differ(first, second);
    expect([from.number, to.number]).toEqual([1, 2]);
    expect(changes).toEqual([
      { pointer: "/parameters/0/expression", place: "parameter m, expression", before: "12", after: "15" },
      { pointer: "/A/3/3", place: "A, row v2, column v2", before: "-0.4", after: "-0.5" },
    ]);
    expect(outdates).toEqual([{ id: design.id, name: "Soft", onRevision: 1 }]);
    expect((await differ(second, first)).outdates).toEqual(outdates);
    expect((await api.get<DesignSummary>(`/api/v1/designs/${design.id}`)).outdated).toBe(true);
    const body = { plantRevisionId: second, recipe: byWeights(), note: "carried over" };
    const carried = await api.post<DesignSummary>(`/api/v1/designs/${design.id}/revisions`, body, design.version);
    expect(carried).toMatchObject({ outdated: false, plantRevision: { number: 2 }, currentRevision: { number: 2 } });
    expect((await differ(first, second)).outdates).toEqual([]);
    const other = await create(api, "Other");
    const mixed = `/api/v1/plants/${plant.id}/difference?from=${first}&to=${other.currentRevision.id}`;
    expect(await problemIn(await api.ask("GET", mixed))).toMatchObject({ status: 404 });
  });
});

test("a plant is renamed, duplicated from any revision, archived and brought back", async () => {
  const { api } = await member();
  const plant = await create(api);
  const path = `/api/v1/plants/${plant.id}`;
  expect(await api.patch(path, { name: "Gantry 2" }, 1)).toMatchObject({ name: "Gantry 2", version: 2 });
  await api.post(`${path}/revisions`, { content: heavier }, 2);
  const copy = await api.post<PlantSummary>(`${path}/duplicate`, { name: "Copy", revisionId: plant.currentRevision.id });
  expect(copy).toMatchObject({ name: "Copy", version: 1, currentRevision: { number: 1 } });
  expect(await newest(api, copy)).toMatchObject({ content: twoCarriages(), note: "From Gantry 2, revision 1" });
  const latest = await api.post<PlantSummary>(`${path}/duplicate`, { name: "Copy of the newest" });
  expect((await newest(api, latest)).content).toEqual(heavier);
  const foreign = { name: "x", revisionId: copy.currentRevision.id };
  expect(await problemIn(await api.ask("POST", `${path}/duplicate`, { body: foreign }))).toMatchObject({ status: 404 });

  const names = async (query: string) =>
    (await api.get<{ items: PlantSummary[] }>(`/api/v1/plants${query}`)).items.map(({ name }) => name).sort();
  const archived = await api.post<PlantSummary>(`${path}/archive`, { archived: true }, 3);
  expect(Math.abs(Date.parse(archived.archivedAt ?? "") - Date.now())).toBeLessThan(60_000);
  expect(await names("")).toEqual(["Copy", "Copy of the newest"]);
  expect(await names("?archived=yes")).toEqual(["Gantry 2"]);
  expect(await names("?archived=all")).toHaveLength(3);
  expect(await api.post(`${path}/archive`, { archived: false }, 4)).toMatchObject({ archivedAt: null, version: 5 });
  expect(await names("")).toContain("Gantry 2");
});

test.each(["POST", "PATCH"] as const)("a %s to a plant that is not there is answered 404", async (method) => {
  const { api } = await member();
  const path = `/api/v1/plants/${randomUUID()}`;
  const body = method === "PATCH" ? { name: "x" } : { archived: true };
  const response = await api.ask(method, method === "PATCH" ? path : `${path}/archive`, { body, version: 1 });
  expect(await problemIn(response)).toMatchObject({ status: 404, code: "not-found" });
});
