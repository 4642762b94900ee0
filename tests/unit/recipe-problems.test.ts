import { describe, expect, test } from "vitest";
import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import { poleCount, recipeProblems } from "@/control/design/recipe-problems";
import { evaluatePlant } from "@/control/plant/evaluate-plant";
import { twoCarriages } from "../helpers/plant-content";
import { byPoles, byWeights, observers } from "../helpers/recipes";

const { model } = evaluatePlant(twoCarriages());
if (!model) throw new Error("the plant of the tests cannot be evaluated");
const problems = (recipe: Recipe, of = model) => recipeProblems(recipe, of);
const places = (recipe: Recipe) => problems(recipe).map(({ pointer }) => pointer);
const square = (size: number, entry: (i: number, j: number) => number) =>
  Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => entry(i, j)));
const unit = (size: number) => square(size, (i, j) => (i === j ? 1 : 0));
const reals = (...values: number[]): PoleEntry[] => values.map((value) => ({ kind: "real", value }));

test("every kind of recipe that fits the plant has no problem", () => {
  for (const make of [byWeights, byPoles]) {
    for (const observer of Object.values(observers)) expect(problems(make({ observer }))).toEqual([]);
  }
  const full = { form: "matrices", state: unit(4), input: unit(2) } as const;
  expect(problems(byWeights({ weights: full, crossWeight: square(4, () => 0).map((row) => row.slice(0, 2)) }))).toEqual([]);
});

test("a pole counts once, a pair twice, however it is written", () => {
  const pair: PoleEntry = { kind: "pair", re: -1, im: 2 };
  const damping: PoleEntry = { kind: "damping", frequency: 3, damping: 0.7 };
  const slow: PoleEntry = { kind: "time-constant", seconds: 2 };
  expect([poleCount([]), poleCount([pair, damping]), poleCount([slow, ...reals(-1)])]).toEqual([0, 4, 2]);
});

describe("weights", () => {
  test("need a deviation for every state and an effort for every input", () => {
    const weights = { form: "deviations", states: [1, null, 1], inputs: [1, 1, 1] } as const;
    expect(problems(byWeights({ weights }))).toEqual([
      { pointer: "/weights/states", message: "The list of accepted deviations needs 4 values; it has 3" },
      { pointer: "/weights/inputs", message: "The list of accepted efforts needs 2 values; it has 3" },
    ]);
  });

  test("as matrices have the plant's shape, and say in signal names where they are not symmetric", () => {
    const weights = (state: number[][], input: number[][]) => byWeights({ weights: { form: "matrices", state, input } });
    expect(places(weights(unit(3), unit(2)))).toEqual(["/weights/state"]);
    expect(places(weights([[1], [0, 1], [0, 0, 1], [0, 0, 0, 1]], unit(2)))).toEqual(["/weights/state"]);
    expect(places(weights([], []))).toEqual(["/weights/state", "/weights/input"]);
    const skew = square(4, (i, j) => (i === 3 && j === 1 ? 0.5 : i === j ? 1 : 0));
    const [problem, ...others] = problems(weights(skew, unit(2)));
    expect(others).toEqual([]);
    expect(problem.pointer).toBe("/weights/state/3/1");
    expect(problem.message).toMatch(/v2.*x2/);
  });

  test("have a cross weight of one row for each state and one column for each input", () => {
    expect(places(byWeights({ crossWeight: unit(4) }))).toEqual(["/crossWeight"]);
    expect(places(byWeights({ crossWeight: [] }))).toEqual(["/crossWeight"]);
  });
});

test("as many poles are needed as there are states", () => {
  for (const poles of [
    reals(-1, -2, -3),
    reals(-1, -2, -3, -4, -5),
    [],
    [...reals(-1, -2, -3), { kind: "pair", re: -1, im: 1 } as const],
  ]) {
    expect(places(byPoles({ poles }))).toEqual(["/poles"]);
  }
});

describe("an observer", () => {
  const at = (observer: ObserverRecipe) => places(byWeights({ observer }));

  test("by poles needs one for each state, a reduced one at most one less", () => {
    expect(at({ kind: "poles", poles: reals(-1, -2, -3) })).toEqual(["/observer/poles"]);
    expect(at({ kind: "reduced", poles: reals(-1, -2, -3, -4) })).toEqual(["/observer/poles"]);
    expect(at({ kind: "reduced", poles: reals(-1, -2, -3) })).toEqual([]);
  });

  test("from noise needs symmetric matrices for the states and the outputs", () => {
    const skew = [
      [1, 0],
      [1e-300, 1],
    ];
    expect(at({ kind: "noise", process: unit(2), measurement: unit(4) })).toEqual(["/observer/process", "/observer/measurement"]);
    expect(at({ kind: "noise", process: unit(4), measurement: skew })).toEqual(["/observer/measurement/1/0"]);
  });

  test("of any kind needs a measured output", () => {
    const blind = { ...model, outputs: [], C: [], D: [] };
    const reduced = byWeights({ observer: observers.reduced });
    expect(problems(reduced, blind).map(({ pointer }) => pointer)).toEqual(["/observer/kind"]);
    expect(problems(byWeights(), blind)).toEqual([]);
  });
});

test("the test starts every state and disturbs every input", () => {
  expect(places(byPoles({ test: { horizon: 1, initialState: [0], inputDisturbance: [0, 0, 0] } }))).toEqual([
    "/test/initialState",
    "/test/inputDisturbance",
  ]);
});
