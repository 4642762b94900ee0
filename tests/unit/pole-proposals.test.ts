import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { plantFacts } from "@/components/designs/recipe/plant-facts";
import { asKind, draftOf, entryOf, movedTo, POLE_KINDS } from "@/components/designs/recipe/pole-drafts";
import { proposeFromPlant, proposeObserver } from "@/components/designs/recipe/propose-poles";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { PoleEntry } from "@/control/design/recipe";
import { poleCount } from "@/control/design/recipe-problems";
import type { Complex, TimeBase } from "@/control/plant/model";
import { resolvePoles } from "@/control/poles/resolve-poles";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { coupledModel } from "../helpers/coupled-model";

const continuous: TimeBase = { kind: "continuous" };
const PERIOD = 0.01;
const sampled: TimeBase = { kind: "sampled", period: PERIOD };
const size = ({ re, im }: Complex) => Math.sqrt(re * re + im * im);

/** The same machine as a computer with a period of 10 ms meets it. */
function sampledModel() {
  const plant = coupledModel();
  const rows = (matrix: readonly (readonly number[])[]) => new Matrix(matrix.map((row) => [...row]));
  const { A, B } = holdEquivalent({ A: rows(plant.A), B: rows(plant.B), period: PERIOD });
  return coupledModel({ timeBase: sampled, A: A.to2DArray(), B: B.to2DArray() });
}

describe("a pole that is moved", () => {
  test("is still said in its own way, and is where it was put to the digits that are written", () => {
    const moved = (entry: PoleEntry, to: Complex) => entryOf(movedTo(draftOf(entry, 1), to, continuous));
    const pair = { re: -3, im: 4 };
    expect(moved({ kind: "damping", frequency: 9, damping: 0.9 }, pair)).toEqual({ kind: "damping", frequency: 5, damping: 0.6 });
    expect(moved({ kind: "pair", re: -1, im: 1 }, pair)).toEqual({ kind: "pair", ...pair });
    expect(moved({ kind: "time-constant", seconds: 1 }, { re: -4, im: 0 })).toEqual({ kind: "time-constant", seconds: 0.25 });
    expect(moved({ kind: "real", value: -1 }, { re: -4.00004, im: 0 })).toEqual({ kind: "real", value: -4 });
  });

  test("of a sampled plant that no time constant can say becomes a plain pole", () => {
    expect(entryOf(movedTo(draftOf({ kind: "time-constant", seconds: 1 }, 1), { re: -0.2, im: 0 }, sampled))).toEqual({
      kind: "real",
      value: -0.2,
    });
  });
});

describe("a pole said in another way", () => {
  const entries: readonly PoleEntry[] = [
    { kind: "pair", re: -3, im: 4 },
    { kind: "damping", frequency: 5, damping: 0.6 },
    { kind: "time-constant", seconds: 0.25 },
    { kind: "real", value: -4 },
  ];
  test.each(["continuous", "sampled"] as const)("is the same pole where it can be said, %s", (kind) => {
    const timeBase = kind === "continuous" ? continuous : sampled;
    for (const entry of entries.filter(({ kind: given }) => timeBase === continuous || given !== "real")) {
      const draft = draftOf(timeBase === sampled && entry.kind === "pair" ? { kind: "pair", re: 0.9, im: 0.2 } : entry, 1);
      const [pole] = resolvePoles([entryOf(draft) as PoleEntry], timeBase);
      const target = pole.im === 0 ? "time-constant" : draft.kind === "pair" ? "damping" : "pair";
      const [again] = resolvePoles([entryOf(asKind(draft, target, timeBase)) as PoleEntry], timeBase);
      // Proposals carry six digits.
      expect(again.re / pole.re).toBeCloseTo(1, 5);
      expect(Math.abs(again.im - pole.im)).toBeLessThan(1e-5 * size(pole));
    }
  });

  test("is left to be typed where it cannot be said", () => {
    expect(asKind(draftOf({ kind: "real", value: 3 }, 1), "time-constant", continuous).first).toBeNull();
    expect(asKind({ key: 1, kind: "damping", first: 4, second: null }, "pair", continuous)).toMatchObject({
      first: null,
      second: null,
    });
  });

  test("keeps its place in the list whatever it is said as", () => {
    for (const { value } of POLE_KINDS)
      expect(asKind(draftOf({ kind: "pair", re: -1, im: 1 }, 7), value, continuous).key).toBe(7);
  });
});

describe("poles proposed from the plant", () => {
  test.each([
    ["continuous", coupledModel()],
    ["sampled", sampledModel()],
  ])("are as many as it has states, decay, and can be placed: %s", (_, model) => {
    const { poles } = plantFacts(model);
    const proposed = proposeFromPlant(poles, model.timeBase);
    expect(poleCount(proposed)).toBe(model.states.length);
    const placed = resolvePoles(proposed, model.timeBase);
    for (const pole of placed) expect(model.timeBase.kind === "continuous" ? pole.re < 0 : size(pole) < 1).toBe(true);
    const { weights: _weights, crossWeight: _cross, degreeOfStability: _degree, ...rest } = defaultRecipe(model);
    const { gains } = computeDesign(model, { ...rest, method: "poles", poles: proposed });
    expect(gains.state).toBe("computed");
  });

  test("damp what rings, mirror what grows, and set repeated ones apart", () => {
    const proposed = proposeFromPlant(
      [
        { re: -0.1, im: 10 },
        { re: -0.1, im: -10 },
        { re: 2, im: 0 },
        { re: 0, im: 0 },
        { re: 0, im: 0 },
      ],
      continuous,
    );
    expect(proposed[0]).toEqual({ kind: "damping", frequency: 10, damping: 0.7 });
    const speeds = resolvePoles(proposed.slice(1), continuous).map(({ re }) => -re);
    expect(speeds.every((speed) => speed > 0)).toBe(true);
    expect(new Set(speeds).size).toBe(3);
  });

  test("of a plant of integrators alone still decay", () => {
    const proposed = proposeFromPlant(
      [
        { re: 0, im: 0 },
        { re: 0, im: 0 },
      ],
      continuous,
    );
    expect(resolvePoles(proposed, continuous).every(({ re }) => re < 0)).toBe(true);
  });
});

describe("observer poles proposed from the loop", () => {
  const loop: readonly Complex[] = [
    { re: -3, im: 4 },
    { re: -20, im: 0 },
    { re: -50, im: 0 },
  ];
  test("are four times as fast", () => {
    expect(proposeObserver(loop, 4, continuous)).toEqual([
      { kind: "pair", re: -12, im: 16 },
      { kind: "real", value: -80 },
      { kind: "real", value: -200 },
    ]);
  });

  test("are as many as asked for, also where pairs do not divide evenly", () => {
    const pairs: readonly Complex[] = [
      { re: -3, im: 4 },
      { re: -6, im: 8 },
    ];
    for (const count of [1, 2, 3, 4]) expect(poleCount(proposeObserver(pairs, count, continuous))).toBe(count);
  });

  test("of a sampled loop lie inside the circle, nearer to its middle", () => {
    const [pair] = resolvePoles(proposeObserver([{ re: 0.8, im: 0.3 }], 2, sampled), sampled);
    expect(size(pair)).toBeLessThan(size({ re: 0.8, im: 0.3 }));
  });

  test("of reduced order are as many as the outputs hide", () => {
    expect(plantFacts(coupledModel()).hidden).toBe(2);
    expect(
      plantFacts(
        coupledModel({
          C: [
            [1, 0, 0, 0],
            [2, 0, 0, 0],
          ],
        }),
      ).hidden,
    ).toBe(3);
    expect(plantFacts(coupledModel({ outputs: [], C: [] })).hidden).toBe(4);
  });
});
