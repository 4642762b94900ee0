import { afterAll, describe, expect, test } from "vitest";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Computation, DesignRevision, DesignRevisionEntry, DesignSummary } from "@/lib/schemas/design";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import type { PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const plantOf = (api: Api, content: PlantContent = twoCarriages(), name = "Gantry") =>
  api.post<PlantSummary>("/api/v1/plants", { name, content });
const design = (api: Api, plant: PlantSummary, recipe: unknown = byWeights(), name = "Soft") =>
  api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, { name, plantRevisionId: plant.currentRevision.id, recipe });
const revisionOf = (api: Api, { currentRevision }: DesignSummary) =>
  api.get<DesignRevision>(`/api/v1/design-revisions/${currentRevision.id}`);
async function curvesOf(api: Api, { currentRevision }: DesignSummary, query: string) {
  const path = `/api/v1/design-revisions/${currentRevision.id}/responses${query}`;
  return (await api.get<{ items: ResponseCurves[] }>(path)).items;
}

describe("a design by", () => {
  const makers = { weights: byWeights, poles: byPoles };
  const cases = (["weights", "poles"] as const).flatMap((method) =>
    (["none", "poles", "noise", "reduced"] as const).map((kind) => ({ method, kind })),
  );
  test.each(cases)(
    "$method with the observer $kind is stored with what the stateless route answers",
    async ({ method, kind }) => {
      const { api } = await member();
      const plant = await plantOf(api);
      const recipe = { ...makers[method](), observer: observers[kind] };
      const made = await design(api, plant, recipe);
      expect(made).toMatchObject({ method, observer: kind, version: 1, outdated: false, currentRevision: { number: 1 } });
      const stored = await revisionOf(api, made);
      expect(stored).toMatchObject({ number: 1, designName: "Soft", plantName: "Gantry", recipe });
      const { evidence } = stored;
      const states = [evidence.gains, evidence.poles, evidence.reference, evidence.responses].map(({ state }) => state);
      expect(states).toEqual(["computed", "computed", "computed", "computed"]);
      expect(evidence.observer.state).toBe(kind === "none" ? "absent" : "computed");
      const body = { plant: { revisionId: plant.currentRevision.id }, recipe };
      const computed = await api.post<Computation>("/api/v1/computations", body);
      expect(computed.evidence).toEqual(evidence);
      expect(computed.model).toEqual(stored.model);
      for (const one of ["step", "initial", "disturbance"]) {
        expect(await curvesOf(api, made, `?kind=${one}`)).toEqual(computed.responses.filter(({ kind }) => kind === one));
      }
      if (evidence.responses.state !== "computed") throw new Error("no responses");
      const { summary } = evidence.responses.value;
      expect(made.summary).toEqual(summary.observer ?? summary.fullState);
    },
  );
});

test("curves come by kind, loop and role, each with its signals named in order", async () => {
  const { api } = await member();
  const made = await design(api, await plantOf(api), byWeights({ observer: observers.noise }));
  const steps = await curvesOf(api, made, "");
  expect(steps.map(({ loop, source, sourceName }) => [loop, source, sourceName])).toEqual([
    ["full-state", 0, "enc1"],
    ["full-state", 1, "enc2"],
    ["observer", 0, "enc1"],
    ["observer", 1, "enc2"],
  ]);
  for (const { signals, values, samples, unit, amplitude } of steps) {
    expect(signals.map(({ role, name, unit }) => `${role} ${name} ${unit}`)).toEqual([
      "commanded enc1 m",
      "commanded enc2 m",
      "output enc1 m",
      "output enc2 m",
      "input F1 N",
      "input F2 N",
    ]);
    expect(values.map(({ length }) => length)).toEqual(Array.from({ length: 6 }, () => samples));
    expect([unit, amplitude]).toEqual(["m", 0.001]);
  }
  const estimates = await curvesOf(api, made, "?kind=initial&loop=observer&signals=state,estimate");
  expect(estimates).toHaveLength(1);
  expect(estimates[0].signals.map(({ role, name }) => `${role} ${name}`)).toEqual(
    ["state", "estimate"].flatMap((role) => ["x1", "x2", "v1", "v2"].map((name) => `${role} ${name}`)),
  );
  // The observer starts at rest, whatever the machine does.
  expect(estimates[0].values.map(([first]) => first)).toEqual([0.001, 0, 0, 0, 0, 0, 0, 0]);
  expect(await curvesOf(api, made, "?kind=disturbance&loop=full-state&signals=input")).toHaveLength(1);
  for (const query of ["?kind=guess", "?loop=open", "?signals=", "?signals=state,nothing", "?from=0"]) {
    const path = `/api/v1/design-revisions/${made.currentRevision.id}/responses${query}`;
    expect(await problemIn(await api.ask("GET", path))).toMatchObject({ status: 422, code: "invalid" });
  }
});

describe("a recipe that cannot be solved", () => {
  const refusalOf = async (api: Api, plant: PlantSummary, recipe: unknown) => {
    const body = { name: "Refused", plantRevisionId: plant.currentRevision.id, recipe };
    const refusal = await problemIn(await api.ask("POST", `/api/v1/plants/${plant.id}/designs`, { body }));
    expect(await api.get(`/api/v1/plants/${plant.id}/designs?archived=all`)).toEqual({ items: [], nextCursor: null });
    return refusal;
  };

  test("because it does not fit the plant is refused with a pointer to each field", async () => {
    const { api } = await member();
    const plant = await plantOf(api);
    const short = byWeights({
      weights: { form: "deviations", states: [1, 1, 1], inputs: [1] },
      crossWeight: [[0, 0]],
      observer: { kind: "reduced", poles: [-1, -2, -3, -4].map((value) => ({ kind: "real", value })) },
      test: { horizon: null, initialState: [0], inputDisturbance: [] },
    });
    const refusal = await refusalOf(api, plant, short);
    expect(refusal).toMatchObject({ status: 422, code: "invalid" });
    expect(refusal.errors?.map(({ pointer }) => pointer)).toEqual([
      "/recipe/weights/states",
      "/recipe/weights/inputs",
      "/recipe/crossWeight",
      "/recipe/observer/poles",
      "/recipe/test/initialState",
      "/recipe/test/inputDisturbance",
    ]);
    const shapeless = await refusalOf(api, plant, {
      ...byWeights(),
      weights: { form: "deviations", states: [0], inputs: ["1"] },
    });
    expect(shapeless.errors?.map(({ pointer }) => pointer)).toEqual(["/recipe/weights/states/0", "/recipe/weights/inputs/0"]);
  });

  test("because no input reaches a mode that does not decay is refused, naming mode and signal", async () => {
    const { api } = await member();
    const typed = twoCarriages();
    const alone = [typed.A[0], typed.A[1], ["0", "0", "-0.4", "0"], ["0", "0", "0", "-0.4"]];
    const B = [typed.B[0], typed.B[1], typed.B[2], ["0", "0"]];
    const refusal = await refusalOf(api, await plantOf(api, twoCarriages({ A: alone, B })), byWeights());
    expect(refusal).toMatchObject({ status: 422, code: "not-stabilizable", data: { state: 3 } });
    expect(refusal.detail).toMatch(/\bv2\b/);
    expect(refusal.data?.pole).toEqual({ re: 0, im: 0 });
  });

  test("because of the wanted poles is refused, naming the pole", async () => {
    const { api } = await member();
    const plant = await plantOf(api);
    const real = (...values: number[]) => byPoles({ poles: values.map((value) => ({ kind: "real", value })) });
    expect(await refusalOf(api, plant, real(-1, -2, 3, -4))).toMatchObject({ status: 422, code: "unstable-pole" });
    expect(await refusalOf(api, plant, real(-1, -2, -3))).toMatchObject({
      status: 422,
      errors: [{ pointer: "/recipe/poles", detail: expect.stringContaining("4 poles are needed") }],
    });
    expect(await refusalOf(api, plant, real(-5, -5, -5, -6))).toMatchObject({ status: 422, code: "pole-multiplicity" });
  });

  test("only in its observer is stored, with the reason in words beside the computed gains", async () => {
    const { api } = await member();
    const C = [
      ["0", "0", "1", "-1"],
      ["0", "0", "0", "0"],
    ];
    const plant = await plantOf(api, twoCarriages({ C }));
    const made = await design(api, plant, byWeights({ observer: observers.noise, reference: { kind: "none" } }));
    const { evidence } = await revisionOf(api, made);
    expect([evidence.gains.state, evidence.reference.state, evidence.responses.state]).toEqual([
      "computed",
      "absent",
      "computed",
    ]);
    expect(evidence.observer).toMatchObject({ state: "refused", code: "not-detectable" });
    if (evidence.observer.state !== "refused") throw new Error("it was computed");
    expect(evidence.observer.sentence).toMatch(/\b(x1|x2)\b/);
    expect(evidence.observer.nextStep).not.toBe("");
  });
});

test("a design is revised from the version it was read at; a stale one is refused and loses nothing", async () => {
  const { api } = await member();
  const plant = await plantOf(api);
  const made = await design(api, plant);
  const path = `/api/v1/designs/${made.id}`;
  const stiffer = byWeights({ degreeOfStability: 5 });
  const body = { plantRevisionId: plant.currentRevision.id, recipe: stiffer, note: "stiffer" };
  const revised = await api.post<DesignSummary>(`${path}/revisions`, body, 1);
  expect(revised).toMatchObject({ version: 2, currentRevision: { number: 2 } });
  const stale = await api.ask("POST", `${path}/revisions`, { body: { ...body, note: "late" }, version: 1 });
  expect(stale.headers.get("etag")).toBe('"2"');
  expect(await problemIn(stale)).toMatchObject({ status: 412, given: 1, current: 2 });
  const { items } = await api.get<{ items: DesignRevisionEntry[] }>(`${path}/revisions`);
  expect(items.map(({ number, note }) => [number, note])).toEqual([
    [2, "stiffer"],
    [1, ""],
  ]);
  const [first, second] = [await revisionOf(api, made), await revisionOf(api, revised)];
  expect([first.recipe, second.recipe]).toEqual([byWeights(), stiffer]);
  expect(second.evidence.gains).not.toEqual(first.evidence.gains);
  const other = await plantOf(api, twoCarriages(), "Other");
  const foreign = { ...body, plantRevisionId: other.currentRevision.id };
  expect(await problemIn(await api.ask("POST", `${path}/revisions`, { body: foreign, version: 2 }))).toMatchObject({
    status: 404,
  });
});

test("a design is renamed, duplicated with evidence of its own, archived and brought back", async () => {
  const { api } = await member();
  const plant = await plantOf(api);
  const made = await design(api, plant, byPoles({ observer: observers.reduced }));
  const path = `/api/v1/designs/${made.id}`;
  expect(await api.patch(path, { name: "Stiff" }, 1)).toMatchObject({ name: "Stiff", version: 2 });
  const copy = await api.post<DesignSummary>(`${path}/duplicate`, { name: "Copy" });
  const [own, theirs] = [await revisionOf(api, copy), await revisionOf(api, made)];
  expect(own).toMatchObject({ note: "From Stiff, revision 1", recipe: theirs.recipe, evidence: theirs.evidence });
  expect(own.id).not.toBe(theirs.id);
  const names = async (query: string) =>
    (await api.get<{ items: DesignSummary[] }>(`/api/v1/plants/${plant.id}/designs${query}`)).items.map(({ name }) => name);
  const count = async () => (await api.get<PlantSummary>(`/api/v1/plants/${plant.id}`)).designCount;
  expect([await names(""), await count()]).toEqual([["Copy", "Stiff"], 2]);
  await api.post(`${path}/archive`, { archived: true }, 2);
  expect([await names(""), await names("?archived=yes"), await count()]).toEqual([["Copy"], ["Stiff"], 1]);
  expect(await revisionOf(api, made)).toMatchObject({ id: theirs.id, evidence: theirs.evidence });
  await api.post(`${path}/archive`, { archived: false }, 3);
  expect(await names("")).toEqual(["Stiff", "Copy"]);
});

describe("the gains that somebody looked at", () => {
  test("are what is stored, and others are refused with nothing stored", async () => {
    const { api } = await member();
    const plant = await plantOf(api);
    const recipe = byWeights();
    const body = { name: "Looked at", plantRevisionId: plant.currentRevision.id, recipe };
    const computed = await api.post<Computation>("/api/v1/computations", { plant: { revisionId: body.plantRevisionId }, recipe });
    if (computed.evidence.gains.state !== "computed") throw new Error("no gains");
    const { K } = computed.evidence.gains.value;
    const { methodVersion } = computed.evidence;
    const path = `/api/v1/plants/${plant.id}/designs`;
    const made = await api.post<DesignSummary>(path, { ...body, shown: { methodVersion, K } });

    const off = K.map((row, i) => row.map((entry, j) => (i === 0 && j === 1 ? entry * (1 + 1e-9) : entry)));
    for (const shown of [
      { methodVersion, K: off },
      { methodVersion, K: K.slice(1) },
      { methodVersion: "0.1", K },
    ]) {
      const created = await problemIn(await api.ask("POST", path, { body: { ...body, shown } }));
      expect(created).toMatchObject({ status: 409, code: "gains-disagree" });
      const added = await problemIn(
        await api.ask("POST", `/api/v1/designs/${made.id}/revisions`, {
          version: made.version,
          body: { plantRevisionId: body.plantRevisionId, recipe, shown },
        }),
      );
      expect(added).toMatchObject({ status: 409, code: "gains-disagree" });
    }
    const { items } = await api.get<{ items: DesignSummary[] }>(path);
    expect(items.map(({ id, version }) => ({ id, version }))).toEqual([{ id: made.id, version: 1 }]);
  });
});
