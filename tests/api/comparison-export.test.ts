import { randomUUID } from "node:crypto";
import { afterAll, describe, expect, test } from "vitest";
import { CAUTIONS } from "@/control/words/cautions";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { type Api, member } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { cellsOf } from "../helpers/csv-records";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights, observers } from "../helpers/recipes";
import { testDatabase } from "../helpers/test-database";

await testDatabase();
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const calm = { form: "deviations", states: [0.002, null, 0.05, 0.05], inputs: [40, 40] } as const;
const firm = byWeights({ reasons: { weights: "Half of the belt's backlash" } });
const soft = byWeights({
  weights: calm,
  observer: observers.noise,
  reasons: { weights: "Twice of it", observer: "As measured" },
});

async function stored(api: Api, content: PlantContent, plantName: string, designs: readonly (readonly [string, unknown])[]) {
  const plant = await api.post<PlantSummary>("/api/v1/plants", { name: plantName, content });
  const revisions: DesignRevision[] = [];
  for (const [name, recipe] of designs) {
    const body = { name, plantRevisionId: plant.currentRevision.id, recipe };
    const { currentRevision } = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, body);
    revisions.push(await api.get<DesignRevision>(`/api/v1/design-revisions/${currentRevision.id}`));
  }
  return { plantId: plant.id, revisions, ids: revisions.map(({ id }) => id) };
}
const twoWeightings = (api: Api) =>
  stored(api, twoCarriages(), "Gantry", [
    ["Firm", firm],
    ["Soft", soft],
  ]);
const file = (api: Api, plantId: string, designs: readonly string[], more = "") =>
  api.ask("GET", `/api/v1/plants/${plantId}/side-by-side?designs=${designs.join(",")}${more}`);

function linesIn(text: string) {
  const records = cellsOf(text);
  return {
    records,
    line: (section: string, item: string, figure = "") =>
      records.find((record) => record[0] === section && record[1] === item && record[2] === figure)?.slice(3),
  };
}
function computed<T>(part: { state: string; value?: T }): T {
  if (part.value === undefined) throw new Error("this part was not computed");
  return part.value;
}

describe("a comparison as CSV", () => {
  test("has one head line, a column per design in the order asked for, and every line as wide as the head", async () => {
    const { api } = await member();
    const { plantId, ids } = await twoWeightings(api);
    const response = await file(api, plantId, ids.toReversed(), "&format=csv");
    expect(response.headers.get("content-type")).toBe("text/csv; charset=utf-8");
    expect(response.headers.get("content-disposition")).toBe('attachment; filename="Gantry side by side.csv"');
    expect(response.headers.get("cache-control")).toBe("private, no-store");
    const { records, line } = linesIn(await response.text());
    expect(records[0]).toEqual(["section", "item", "figure", "unit", "Soft", "Firm", "best", "worst"]);
    expect(new Set(records.slice(0, -1).map(({ length }) => length))).toEqual(new Set([8]));
    expect(line("Plant", "plant")?.slice(1, 3)).toEqual(["Gantry", "Gantry"]);
  });

  test("holds recipe, reasons, law, poles, figures and efforts with their units, at full precision", async () => {
    const { api } = await member();
    const { plantId, ids, revisions } = await twoWeightings(api);
    const { line } = linesIn(await (await file(api, plantId, ids)).text());
    expect(line("Largest deviation accepted", "x1")).toEqual(["m", "0.001", "0.002", "", ""]);
    expect(line("Largest deviation accepted", "x2")).toEqual(["m", "0.001", "not weighted", "", ""]);
    expect(line("Test", "initial state x1")).toEqual(["m", "0.001", "0.001", "", ""]);
    expect(line("Noise on the states", "v1")?.slice(0, 3)).toEqual(["(m/s)²/s", "", "0.01"]);
    expect(line("Reasons", "state weights")).toEqual(["", "Half of the belt's backlash", "Twice of it", "", ""]);
    expect(line("Reasons", "observer")).toEqual(["", "", "As measured", "", ""]);
    expect(line("Design", "control law")?.[1]).toMatch(/^u = -K x \+ F r/);
    expect(line("Design", "observer")?.slice(1, 3)).toEqual(["no observer", "an observer of full order 4, from noise"]);
    const full = revisions.map(({ evidence }) => computed(evidence.responses).summary.fullState);
    const title = "Figures with the full state, worst over everything commanded";
    expect(line(title, "settling, 2 %")?.slice(0, 3)).toEqual(["s", ...full.map(({ worstSettling }) => String(worstSettling))]);
    expect(line(title, "peak effort, F1")?.slice(0, 3)).toEqual([
      "N",
      ...full.map(({ peakEffort }) => String(peakEffort[0].peak)),
    ]);
    expect(line(title, "peak effort, F1", "over its limit")?.slice(0, 3)).toEqual([
      ...["1", ...full.map(({ peakEffort }) => String(peakEffort[0].overLimit))],
    ]);
    const pole = line("Closed-loop poles", "left, slowest", "real part");
    expect([pole?.[0], Number(pole?.[1]) < 0, Number(pole?.[2]) < 0]).toEqual(["1/s", true, true]);
  });

  test("says who is best and worst by each figure, what the trade bought, and every caution", async () => {
    const { api } = await member();
    const { plantId, ids, revisions } = await twoWeightings(api);
    const { records, line } = linesIn(await (await file(api, plantId, ids)).text());
    const title = "Figures with the full state, worst over everything commanded";
    const [a, b] = revisions.map(({ evidence }) => computed(evidence.responses).summary.fullState.peakEffort[0].peak);
    expect(a).not.toBe(b);
    expect(line(title, "peak effort, F1")?.slice(3)).toEqual(a < b ? ["Firm", "Soft"] : ["Soft", "Firm"]);
    const [, first, second] = line("What each trade bought", "against the first") ?? [];
    expect(first).toBe("what the others are held against");
    expect(second).toMatch(/^Against Firm, Soft .+; both with the full state, since Firm has no observer in its loop\.$/);
    expect(records.filter(([section]) => section === "Caution").map(([, caution]) => caution)).toEqual([...CAUTIONS]);
  });

  test("holds every entry of every gain bit for bit, named by its signals, empty where a design has no such matrix", async () => {
    const { api } = await member();
    const { plantId, ids, revisions } = await twoWeightings(api);
    const { records } = linesIn(await (await file(api, plantId, ids)).text());
    const column = (section: string, place: number) =>
      records.filter((record) => record[0] === section).map((record) => record[place]);
    for (const [k, { evidence }] of revisions.entries()) {
      expect(column("K, state feedback", 4 + k).map(Number)).toEqual(computed(evidence.gains).K.flat());
      expect(column("F, reference", 4 + k).map(Number)).toEqual(computed(evidence.reference).F.flat());
    }
    expect(records.find(([section]) => section === "K, state feedback")?.slice(1, 4)).toEqual(["F1", "for x1", "N per m"]);
    const { L } = computed(revisions[1].evidence.observer) as { L: number[][] };
    expect(column("L, observer", 5).map(Number)).toEqual(L.flat());
    expect(new Set(column("L, observer", 4))).toEqual(new Set([""]));
  });

  test("tells revisions of one design apart, and designs by poles from designs by weights", async () => {
    const { api } = await member();
    const plant = await api.post<PlantSummary>("/api/v1/plants", { name: "Gantry", content: twoCarriages() });
    const pinned = { plantRevisionId: plant.currentRevision.id };
    const made = await api.post<DesignSummary>(`/api/v1/plants/${plant.id}/designs`, { name: "One", recipe: firm, ...pinned });
    const next = byPoles({ observer: observers.reduced });
    const later = await api.post<DesignSummary>(`/api/v1/designs/${made.id}/revisions`, { recipe: next, ...pinned }, 1);
    const ids = [made.currentRevision.id, later.currentRevision.id];
    const { records, line } = linesIn(await (await file(api, plant.id, ids)).text());
    expect(records[0].slice(4, 6)).toEqual(["One revision 1", "One revision 2"]);
    expect(line("Wanted poles", "entry 1", "damping")).toEqual(["1", "", "0.7", "", ""]);
    expect(line("Fw, observer dynamics", "w1", "for w1")?.[0]).toBe("in the observer's own coordinates");
  });

  test("never becomes a formula of a spreadsheet, whatever plant, designs, signals and reasons say", async () => {
    const { api } = await member();
    const hostile = ["=1+1", "+1", "-1", "@SUM(A1)"];
    const content = twoCarriages({
      states: twoCarriages().states.map((state, index) => ({ ...state, name: hostile[index], unit: "=m" })),
    });
    const reasons = { weights: "\t=cmd|' /C calc'!A0", "state:0": "＝1+1" };
    const { plantId, ids } = await stored(api, content, "=plant", [
      ["=HYPERLINK(A1)", { ...firm, reasons }],
      ["+two", { ...soft, reasons: { weights: " =1" } }],
    ]);
    const { records } = linesIn(await (await file(api, plantId, ids)).text());
    const cells = records.flat().filter((cell) => /^\s*[=+\-@＝]/.test(cell));
    expect(cells.length).toBeGreaterThan(0);
    for (const cell of cells) expect(Number.isFinite(Number(cell)), cell).toBe(true);
    for (const shown of ["'=1+1", "'+1", "'-1", "'@SUM(A1)", "'=m", "'=plant", "'=HYPERLINK(A1)", "'+two"])
      expect(records.flat()).toContain(shown);
  });
});

test("a file of designs that are not two to six of this plant of this team is refused like the page of them", async () => {
  const { ctx, api } = await member();
  const { plantId, ids } = await twoWeightings(api);
  const other = await twoWeightings(api);
  const stranger = (await member()).api;
  const foreign = await twoWeightings(stranger);
  const refused = async (designs: readonly string[], of = plantId, who = api) => {
    const { status, code, errors } = await problemIn(await file(who, of, designs));
    return [status, code, errors?.[0].pointer];
  };
  const absent = [404, "not-found", undefined];
  expect(await refused([ids[0], randomUUID()])).toEqual(absent);
  expect(await refused([ids[0], other.ids[0]])).toEqual(absent);
  expect(await refused([ids[0], foreign.ids[0]])).toEqual(absent);
  expect(await refused(ids, other.plantId)).toEqual(absent);
  expect(await refused(ids, randomUUID())).toEqual(absent);
  expect(await refused(ids, plantId, stranger)).toEqual(absent);
  const invalid = [422, "invalid", "/designs"];
  expect(await refused(ids.slice(1))).toEqual(invalid);
  expect(await refused([ids[0], ids[0]])).toEqual(invalid);
  expect(await refused(Array.from({ length: 7 }, () => randomUUID()))).toEqual(invalid);
  expect(await refused([ids[0], "no-id"])).toEqual([422, "invalid", "/designs/1"]);
  const reviewer = (await member(ctx.teamId, "reviewer")).api;
  expect(
    (
      await file(
        reviewer,
        plantId,
        ids.map((id) => id.toUpperCase()),
      )
    ).status,
  ).toBe(200);
});
