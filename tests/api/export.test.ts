import { afterAll, describe, expect, test } from "vitest";
import { CAUTIONS } from "@/control/words/cautions";
import { closePool } from "@/db/client";
import type { GainDocument } from "@/lib/files/gain-document";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { PlantSummary } from "@/lib/schemas/plant";
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

async function stored(
  api: Api,
  { content = twoCarriages(), recipe = byWeights() as unknown, plant = "Gantry", name = "Soft" } = {},
) {
  const made = await api.post<PlantSummary>("/api/v1/plants", { name: plant, content });
  const body = { name, plantRevisionId: made.currentRevision.id, recipe };
  const { currentRevision } = await api.post<DesignSummary>(`/api/v1/plants/${made.id}/designs`, body);
  return api.get<DesignRevision>(`/api/v1/design-revisions/${currentRevision.id}`);
}
const file = (api: Api, { id }: DesignRevision, query = "") => api.ask("GET", `/api/v1/design-revisions/${id}/gains${query}`);

/** The entries below the head line that begins with this symbol, with the names and units along both edges. */
function matrixIn(records: string[][], symbol: string, rows: number) {
  const head = records.findIndex(([first]) => first === symbol);
  const body = records.slice(head + 2, head + 2 + rows);
  return {
    columns: records[head].slice(2).filter(Boolean),
    units: records[head + 1].slice(2).filter(Boolean),
    rows: body.map(([name, unit]) => `${name} ${unit}`),
    entries: body.map((record) => record.slice(2).filter(Boolean).map(Number)),
  };
}
function computed<T>(part: { state: string; value?: T }): T {
  if (part.value === undefined) throw new Error("this part was not computed");
  return part.value;
}

describe("the gain as CSV", () => {
  test("comes back bit for bit, in the order and units of the plant's signals", async () => {
    const { api } = await member();
    const revision = await stored(api, { recipe: byWeights({ observer: observers.noise }) });
    const response = await file(api, revision);
    expect(response.headers.get("content-type")).toBe("text/csv; charset=utf-8");
    expect(response.headers.get("content-disposition")).toBe('attachment; filename="Gantry Soft r1 gain.csv"');
    expect(response.headers.get("cache-control")).toBe("private, no-store");
    const records = cellsOf(await response.text());
    const { gains, reference, observer } = revision.evidence;
    expect(matrixIn(records, "K", 2)).toEqual({
      columns: ["x1", "x2", "v1", "v2"],
      units: ["m", "m", "m/s", "m/s"],
      rows: ["F1 N", "F2 N"],
      entries: computed(gains).K,
    });
    expect(matrixIn(records, "F", 2)).toMatchObject({ columns: ["enc1", "enc2"], entries: computed(reference).F });
    const { L } = computed(observer) as { L: number[][] };
    expect(matrixIn(records, "L", 4)).toMatchObject({ rows: ["x1 m", "x2 m", "v1 m/s", "v2 m/s"], entries: L });
  });

  test("says law, time base, revisions, residual and every caution", async () => {
    const { api } = await member();
    const text = await (await file(api, await stored(api))).text();
    const records = cellsOf(text);
    const line = (name: string) => records.find(([first]) => first === name)?.filter(Boolean);
    expect(line("control law")?.[1]).toMatch(/^u = -K x \+ F r/);
    expect(line("time base")?.[1]).toMatch(/^Continuous law/);
    expect(line("plant")).toEqual(["plant", "Gantry", "revision", "1"]);
    expect(line("residual")).toHaveLength(4);
    expect(records.filter(([first]) => first === "caution").map(([, caution]) => caution)).toEqual([...CAUTIONS]);
    expect(new Set(records.slice(0, -1).map(({ length }) => length)).size).toBe(1);
  });

  test("of a sampled plant names its period and the sampled observer", async () => {
    const { api } = await member();
    const content = twoCarriages({
      timeBase: { kind: "sampled", period: 0.002 },
      A: [
        ["1", "0", "0.002", "0"],
        ["0", "1", "0", "0.002"],
        ["-0.01", "0.01", "0.99", "0"],
        ["0.01", "-0.01", "0", "0.99"],
      ],
      B: [
        ["0", "0"],
        ["0", "0"],
        ["0.0002", "0"],
        ["0", "0.0002"],
      ],
    });
    const poles = [0.9, 0.92, 0.94, 0.96].map((value) => ({ kind: "real" as const, value }));
    const revision = await stored(api, {
      content,
      recipe: byPoles({ poles, observer: { kind: "reduced", poles: poles.slice(0, 2) } }),
    });
    const records = cellsOf(await (await file(api, revision, "?format=csv")).text());
    expect(records.find(([first]) => first === "period")?.slice(1, 3)).toEqual(["0.002", "s"]);
    expect(records.find(([first]) => first === "observer")?.[1]).toMatch(/^w\(k\+1\) = Fw w/);
    expect(matrixIn(records, "Fw", 2).columns).toEqual(["w1", "w2"]);
  });

  test("never becomes a formula of a spreadsheet, whatever plant, design and signals are called", async () => {
    const { api } = await member();
    const hostile = ["=1+1", "+1", "-1", "@SUM(A1)", " =1", "＝1+1"];
    const [plant, name, ...names] = hostile;
    const content = twoCarriages({
      states: twoCarriages().states.map((state, index) => ({ ...state, name: names[index] ?? state.name, unit: "=m" })),
    });
    const records = cellsOf(await (await file(api, await stored(api, { content, plant, name }))).text());
    const cells = records.flat().filter((cell) => /^\s*[=+\-@＝]/.test(cell));
    expect(cells.length).toBeGreaterThan(0);
    for (const cell of cells) expect(Number.isFinite(Number(cell)), cell).toBe(true);
    for (const shown of ["'=1+1", "'+1", "'-1", "'@SUM(A1)", "'=m"]) expect(records.flat()).toContain(shown);
  });
});

test("the gain as JSON holds the same doubles with everything beside them", async () => {
  const { api } = await member();
  const revision = await stored(api, { recipe: byPoles({ observer: observers.poles }) });
  const response = await file(api, revision, "?format=json");
  expect(response.headers.get("content-type")).toBe("application/json");
  expect(response.headers.get("content-disposition")).toContain("gain.json");
  const document: GainDocument = await response.json();
  const { gains, reference, methodVersion } = revision.evidence;
  expect(document).toMatchObject({
    kind: "gain",
    plant: { name: "Gantry", revision: 1 },
    design: { name: "Soft", revision: 1 },
    timeBase: { kind: "continuous" },
    methodVersion,
    law: expect.stringContaining("u = -K xhat + F r"),
    observerLaw: "xhat' = A xhat + B u + L (y - C xhat - D u)",
    cautions: [...CAUTIONS],
  });
  const [K, F, L] = document.matrices;
  expect([K.symbol, F.symbol, L.symbol]).toEqual(["K", "F", "L"]);
  expect(K.entries).toEqual(computed(gains).K);
  expect(F.entries).toEqual(computed(reference).F);
  expect(document.operatingPoint.map(({ symbol, name }) => `${symbol} ${name}`)).toContain("u0 F2");
});

test("a name with quotes, line signs and other scripts makes a harmless file name", async () => {
  const { api } = await member();
  const revision = await stored(api, { plant: 'Portal "A"; filename=x.exe/../龍', name: "Straße ☃" });
  const disposition = (await file(api, revision)).headers.get("content-disposition") ?? "";
  expect(disposition).toMatch(/^attachment; filename="[\x20-\x21\x23-\x5b\x5d-\x7e]+"; filename\*=UTF-8''[\w!#$&+.^`|~%-]+$/);
  expect(disposition).not.toMatch(/[/\\]/);
});

test("there is no other format, and no gain of a revision that is not there", async () => {
  const { api } = await member();
  const revision = await stored(api);
  expect(await problemIn(await file(api, revision, "?format=xml"))).toMatchObject({
    status: 422,
    errors: [{ pointer: "/format" }],
  });
  const elsewhere = { ...revision, id: "0f0e0d0c-0b0a-4908-8706-050403020100" };
  expect(await problemIn(await file(api, elsewhere))).toMatchObject({ status: 404 });
});
