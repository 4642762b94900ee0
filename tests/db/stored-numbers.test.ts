import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { Evidence } from "@/control/design/evidence";
import { closePool, inTransaction } from "@/db/client";
import { findEvidence, findResponseRecords, insertEvidence, insertResponseRecords } from "@/db/queries/evidence";
import { withClient } from "@/lib/commands/databases.mjs";
import { closeNumericPool, runNumeric } from "@/lib/jobs/run-numeric";
import type { PlantRevision, PlantSummary } from "@/lib/schemas/plant";
import { insertWithEvidence } from "@/lib/services/designs/create";
import { checksum } from "../helpers/fault-injection";
import { twoCarriages } from "../helpers/plant-content";
import { byWeights, observers } from "../helpers/recipes";
import { seededUniform } from "../helpers/seeded";
import { type Stock, stockedTeam } from "../helpers/stocked-team";
import { testDatabase } from "../helpers/test-database";

const { adminUrl } = await testDatabase();
let stock: Stock;
beforeAll(async () => {
  stock = await stockedTeam(adminUrl);
});
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

const EXTREMES = [
  5e-324,
  2.2250738585072014e-308,
  1.7976931348623157e308,
  -1.7976931348623157e308,
  0.1,
  1 / 3,
  2 ** 53 + 2,
  1e21,
  1e-7,
  0,
];
const SEED = 20_310_405;

/** Doubles of every size: random bits, those that are no number left out. */
function randomDoubles(count: number): number[] {
  const random = seededUniform(SEED);
  const word = () => Math.floor(random() * 2 ** 32);
  const view = new DataView(new ArrayBuffer(8));
  const made: number[] = [];
  while (made.length < count) {
    view.setUint32(0, word());
    view.setUint32(4, word());
    const value = view.getFloat64(0);
    if (Number.isFinite(value)) made.push(value);
  }
  return made;
}
const numbers = [...EXTREMES, ...randomDoubles(2_000)];
const bits = (values: ArrayLike<number>) => Buffer.from(Float64Array.from(values).buffer).toString("hex");

/** A further revision of the stocked design, without evidence. */
async function emptyRevision(number: number) {
  const { ctx, ids } = stock;
  const { rows } = await withClient(adminUrl, (client) =>
    client.query(
      `insert into design_revisions (team_id, created_by, plant_id, design_id, plant_revision_id, number, recipe, method_version)
       values ($1, $2, $3, $4, $5, $6, $7, '1') returning id`,
      [ctx.teamId, ctx.userId, ids.plantId, ids.designId, ids.revisionId, number, byWeights()],
    ),
  );
  return { teamId: ctx.teamId, revisionId: String(rows[0].id) };
}

describe("a stored number is the same double when it is read", () => {
  test("in a document of evidence, from the smallest to the largest", async () => {
    const key = await emptyRevision(100);
    await inTransaction(stock.ctx, (tx) => insertEvidence(tx, key, [{ part: "gains", state: "computed", content: { numbers } }]));
    const [row] = await inTransaction(stock.ctx, (tx) => findEvidence(tx, key));
    expect(bits((row.content as { numbers: number[] }).numbers), `seed ${SEED}`).toBe(bits(numbers));
  });

  test("in the samples of a response, which are stored in portions and come back in their order", async () => {
    const key = await emptyRevision(101);
    const about = { kind: "step", loop: "full-state", amplitude: 1, samples: 100_000, step: 0.01 } as const;
    const random = seededUniform(SEED);
    const records = Array.from({ length: 7 }, (_, source) => {
      const values = Float64Array.from({ length: 100_000 }, () => random() - 0.5);
      values.set(numbers, source);
      return { ...about, source, values };
    });
    await inTransaction(stock.ctx, (tx) => insertResponseRecords(tx, key, records));
    const found = await inTransaction(stock.ctx, (tx) => findResponseRecords(tx, key, { kind: "step", loop: "both" }));
    expect(found.map(({ source }) => source)).toEqual([0, 1, 2, 3, 4, 5, 6]);
    found.forEach(({ values }, index) => {
      expect(Buffer.compare(Buffer.from(values.buffer), Buffer.from(records[index].values.buffer)), `seed ${SEED}`).toBe(0);
    });
  });

  test("in a plant, where a minus before zero is no surprise", async () => {
    const typed = twoCarriages();
    const A = [["-0", "0*(-1)", "1", "1e-320"], ["-1/3", "1.7976931348623157e308", "0", "1"], ...typed.A.slice(2)];
    const body = { name: "Odd", content: twoCarriages({ A }) };
    const plant = await stock.api.post<PlantSummary>("/api/v1/plants", body);
    const { model } = await stock.api.get<PlantRevision>(`/api/v1/plants/${plant.id}/revisions/${plant.currentRevision.id}`);
    expect(bits(model.A[0])).toBe(bits([0, 0, 1, 1e-320]));
    expect(bits(model.A[1])).toBe(bits([-1 / 3, 1.7976931348623157e308, 0, 1]));
  });
});

test.each(["1e400", "-1e400", "1/0", "0/0", "sqrt(-1)", "exp(1000)", "1e308*10"])(
  "an entry %s, which is no finite number, is refused at its cell",
  async (entry) => {
    const A = [[entry, "0", "1", "0"], ...twoCarriages().A.slice(1)];
    const before = await checksum(adminUrl);
    const response = await stock.api.ask("POST", "/api/v1/plants", { body: { name: "x", content: twoCarriages({ A }) } });
    expect([response.status, (await response.json()).errors[0].pointer]).toEqual([422, "/content/A/0/0"]);
    expect((await checksum(adminUrl)).replace(/^public\.sessions .*$/m, "")).toBe(before.replace(/^public\.sessions .*$/m, ""));
  },
);

describe("evidence with a number that is none is not stored", () => {
  type Change = (evidence: Evidence) => void;
  const breaks: [string, Change][] = [
    ["in a gain", ({ gains }) => gains.state === "computed" && Object.assign(gains.value.K[0], { 0: Number.NaN })],
    [
      "in a residual",
      ({ gains }) => gains.state === "computed" && Object.assign(gains.value, { residual: Number.POSITIVE_INFINITY }),
    ],
    ["in a pole", ({ poles }) => poles.state === "computed" && Object.assign(poles.value[0].pole, { im: Number.NaN })],
    ["in an observer", ({ observer }) => observer.state === "computed" && Object.assign(observer.value, { bound: Number.NaN })],
    [
      "in a sample",
      ({ responses }) => responses.state === "computed" && responses.value.records[3].values.fill(Number.NaN, 40, 41),
    ],
  ];
  test.each(breaks)("%s", async (_, change) => {
    const { ctx, ids, api } = stock;
    const path = `/api/v1/plants/${ids.plantId}/revisions/${ids.revisionId}`;
    const { model } = await api.get<PlantRevision>(path);
    const recipe = byWeights({ observer: observers.noise });
    const evidence = await runNumeric({ kind: "design", model, recipe }, { teamId: ctx.teamId });
    change(evidence);
    const before = await checksum(adminUrl);
    const revision = {
      plantId: ids.plantId,
      designId: ids.designId,
      number: 200,
      plantRevisionId: ids.revisionId,
      recipe,
      note: "",
    };
    const storing = inTransaction(ctx, (tx) => insertWithEvidence(tx, ctx, revision, evidence));
    await expect(storing).rejects.toThrow("not finite");
    expect(await checksum(adminUrl)).toBe(before);
  });
});
