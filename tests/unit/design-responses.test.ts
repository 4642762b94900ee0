import { describe, expect, test } from "vitest";
import { type GridWanted, type ResponseData, resample, responsePicture } from "@/components/designs/responses/response-rows";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { Recipe } from "@/control/design/recipe";
import { toCurves } from "@/lib/services/designs/to-curves";
import { coupledModel } from "../helpers/coupled-model";

const model = coupledModel();
const recipe: Recipe = {
  ...defaultRecipe(model),
  observer: {
    kind: "poles",
    poles: [
      { kind: "damping", frequency: 60, damping: 0.8 },
      { kind: "damping", frequency: 80, damping: 0.8 },
    ],
  },
};

function responsesOf(of: Recipe) {
  const { responses } = computeDesign(model, of);
  if (responses.state !== "computed") throw new Error(responses.code);
  const { records, figures } = responses.value;
  return {
    figures,
    curves: records.map((record) => toCurves(record, model, ["commanded", "output", "state", "estimate", "input"])),
  };
}

const { curves, figures } = responsesOf(recipe);
const data: ResponseData = { model, curves, figures, ghosts: [] };
const wanted: GridWanted = { kind: "step", loop: "observer", roles: ["commanded", "output", "state", "input"] };

function picture(more: Partial<GridWanted> = {}, from: Partial<ResponseData> = {}) {
  const found = responsePicture({ ...data, ...from }, { ...wanted, ...more });
  if (!found) throw new Error("nothing to draw");
  return found;
}

describe("the picture of coupled responses", () => {
  test("has a column per command and a row per quantity, named with units", () => {
    const { columns, rows } = picture();
    expect(columns.map(({ label }) => label)).toEqual(["x1 commanded 0.001 m", "x2 commanded 0.002 m"]);
    expect(rows.map(({ label }) => label)).toEqual([
      "x1",
      "x2",
      "enc1",
      "enc2",
      "x1, state",
      "x2, state",
      "v1",
      "v2",
      "F1",
      "F2",
    ]);
    expect(rows.every(({ unit, cells }) => unit !== "" && cells.length === 2)).toBe(true);
  });

  test("marks what was commanded itself; cells off the diagonal are the coupling", () => {
    const { rows } = picture({ roles: ["commanded"] });
    expect(rows.map(({ cells }) => cells.map((cell) => cell?.own))).toEqual([
      [true, false],
      [false, true],
    ]);
    expect(rows[0].cells[0]?.final).toBeCloseTo(0.001, 12);
    expect(rows[1].cells[0]?.final).toBe(0);
  });

  test("gives a peak the sign that the curve has, and the size of the evidence", () => {
    const { rows } = picture({ roles: ["input"] });
    for (const [index, { cells }] of rows.entries()) {
      for (const [source, cell] of cells.entries()) {
        const stated = figures.find((step) => step.loop === "observer" && step.source === source)?.effort[index].peak;
        const largest = Array.from(cell?.values ?? []).reduce(
          (most, value) => (Math.abs(value) > Math.abs(most) ? value : most),
          0,
        );
        expect(Math.abs(cell?.peak ?? 0)).toBe(stated);
        expect(Math.sign(cell?.peak ?? 0)).toBe(Math.sign(largest));
      }
    }
  });

  test("draws limits as the way from the operating point", () => {
    const [first, second] = picture({ roles: ["input"] }).rows;
    expect(first.limits).toEqual({ lower: -140, upper: 100 });
    expect(second.limits).toEqual({ lower: -120, upper: 120 });
  });

  test("lays the estimate beside a state, and the full state beside the loop with observer", () => {
    const [state] = picture({ kind: "initial", roles: ["state"] }).rows.slice(2);
    expect(state.cells[0]?.estimated?.[0]).toBe(0);
    expect(state.cells[0]?.values[0]).toBe(0.05);
    const both = picture({ kind: "initial", loop: "both", roles: ["state"] }).rows[2].cells[0];
    expect(both?.fullState?.[0]).toBe(0.05);
    expect(both?.estimated).toBeNull();
    expect(picture({ kind: "initial", loop: "full-state", roles: ["state"] }).rows[2].cells[0]?.fullState).toBeNull();
  });

  test("names what disturbs", () => {
    expect(picture({ kind: "disturbance" }).columns.map(({ label }) => label)).toEqual([
      "F1 disturbed by 4 N",
      "F2 disturbed by 4 N",
    ]);
  });

  test("brings the ghost of the last save to its own instants", () => {
    const slower = responsesOf({ ...recipe, test: { ...recipe.test, horizon: 2 } });
    const { rows, time } = picture({ roles: ["commanded"] }, { ghosts: slower.curves });
    const cell = rows[0].cells[0];
    expect(cell?.ghost).toHaveLength(time.samples);
    // Straight lines between the coarser samples: as far off as they are apart, a few percent of the step.
    for (const k of [0, 100, 400]) expect(Math.abs((cell?.ghost?.[k] ?? 0) - (cell?.values[k] ?? 0))).toBeLessThan(5e-5);
  });

  test("is nothing where there are no such curves", () => {
    const silent = responsesOf({ ...recipe, reference: { kind: "none" } });
    expect(responsePicture({ ...data, ...silent }, wanted)).toBeNull();
    expect(responsePicture({ ...data, curves: [] }, wanted)).toBeNull();
  });

  test("holds inputs of a sampled plant between samples", () => {
    const sampled = coupledModel({ timeBase: { kind: "sampled", period: 0.01 } });
    expect(picture({ roles: ["input"] }, { model: sampled }).rows.map(({ held }) => held)).toEqual([true, true]);
    expect(picture({ roles: ["input"] }).rows.map(({ held }) => held)).toEqual([false, false]);
  });
});

describe("a curve at other instants", () => {
  test("is met exactly where they coincide, and stays at its last value beyond its end", () => {
    expect(resample([0, 1, 4], 1, { samples: 5, step: 0.5 })).toEqual([0, 0.5, 1, 2.5, 4]);
    expect(resample([0, 1], 1, { samples: 4, step: 1 })).toEqual([0, 1, 1, 1]);
  });
});
