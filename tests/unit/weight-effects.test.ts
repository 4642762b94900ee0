import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { WeightsRecipe } from "@/control/design/recipe";
import { recipeFigures } from "@/control/design/recipe-figures";
import { weightEffects } from "@/control/design/weight-effects";
import { designLqr } from "@/control/lqr/design-lqr";
import { gainSlope } from "@/control/lqr/gain-slope";
import type { TimeBase } from "@/control/plant/model";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { coupledModel } from "../helpers/coupled-model";

const PERIOD = 0.01;
const matrix = (rows: readonly (readonly number[])[]) => new Matrix(rows.map((row) => [...row]));

function sampledModel() {
  const plant = coupledModel();
  const { A, B } = holdEquivalent({ A: matrix(plant.A), B: matrix(plant.B), period: PERIOD });
  return coupledModel({ timeBase: { kind: "sampled", period: PERIOD }, A: A.to2DArray(), B: B.to2DArray() });
}

/** Central difference of the gain over a change of the weights. */
function difference(model: ReturnType<typeof coupledModel>, timeBase: TimeBase, Q: Matrix, R: Matrix, dQ: Matrix, dR: Matrix) {
  const t = 1e-4;
  const at = (sign: number) =>
    designLqr({
      A: matrix(model.A),
      B: matrix(model.B),
      stateWeight: Matrix.add(Q, Matrix.mul(dQ, sign * t)),
      inputWeight: Matrix.add(R, Matrix.mul(dR, sign * t)),
      timeBase,
    }).K;
  return Matrix.sub(at(1), at(-1)).mul(1 / (2 * t));
}

describe("the slope of a gain over its weights", () => {
  test.each([
    ["continuous", coupledModel(), { kind: "continuous" } as TimeBase],
    ["sampled", sampledModel(), { kind: "sampled", period: PERIOD } as TimeBase],
  ])("is what a small change of the weights gives, %s", (_, model, timeBase) => {
    const Q = Matrix.diag([9e5, 8e5, 300, 500]);
    const R = Matrix.diag([6e-4, 9e-4]);
    const dQ = Matrix.diag([9e5, 0, 0, 0]);
    const dR = new Matrix([
      [0, 1e-4],
      [1e-4, 9e-4],
    ]);
    const { K, X } = designLqr({ A: matrix(model.A), B: matrix(model.B), stateWeight: Q, inputWeight: R, timeBase });
    const slope = gainSlope({
      ...{ A: matrix(model.A), B: matrix(model.B), K, P: X, inputWeight: R },
      stateChange: dQ,
      inputChange: dR,
      sampled: timeBase.kind === "sampled",
    });
    const seen = difference(model, timeBase, Q, R, dQ, dR);
    // A central difference over t = 1e-4 of the weights is good to t² in its slope.
    const size = slope.norm("frobenius");
    expect(Matrix.sub(slope, seen).norm("frobenius") / size).toBeLessThan(1e-6);
  });
});

describe("what a weight does", () => {
  const model = coupledModel();
  const recipe = defaultRecipe(model) as WeightsRecipe;

  test("is predicted near to what solving with twice the weight gives, for every weight above zero", () => {
    const found = weightEffects(model, recipe);
    if (found.state === "refused" || recipe.weights.form !== "deviations") throw new Error("not computed");
    const { now, effects } = found.value;
    const { states, inputs } = recipe.weights;
    const weighted = states.filter((state) => state !== null).length + inputs.length;
    expect(effects).toHaveLength(weighted);
    const half = (list: readonly (number | null)[], at: number) =>
      list.map((value, index) => (index === at && value !== null ? value / Math.SQRT2 : value));
    for (const { of, index, doubled } of effects) {
      const weights = {
        ...recipe.weights,
        ...(of === "state" ? { states: half(states, index) } : { inputs: half(inputs, index) as number[] }),
      };
      const solved = recipeFigures(model, { ...recipe, weights });
      if (solved.state === "refused" || !doubled) throw new Error("not computed");
      const change = (figures: typeof now) => figures.peakEffort.map(({ peak }, j) => peak - now.peakEffort[j].peak);
      const largest = Math.max(...change(solved.value).map(Math.abs));
      change(doubled).forEach((predicted, j) => {
        const negligible = 1e-4 * now.peakEffort[j].peak;
        expect(Math.abs(predicted - change(solved.value)[j])).toBeLessThan(0.3 * largest + negligible);
      });
    }
  });

  test("with a degree of stability is predicted from the equation that was solved", () => {
    const fast = { ...recipe, degreeOfStability: 2 };
    const found = weightEffects(model, fast);
    const solved = recipeFigures(model, fast);
    expect(found.state === "computed" && found.value.now).toEqual(solved.state === "computed" && solved.value);
  });

  test("of a recipe without gains is its refusal", () => {
    const weights = { form: "deviations" as const, states: [null, null, null, null], inputs: [1, 1] };
    const loose = coupledModel({ A: model.A.map((row) => row.map(() => 0)) });
    expect(weightEffects(loose, { ...recipe, weights }).state).toBe("refused");
  });
});
