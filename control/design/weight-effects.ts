import { Matrix } from "ml-matrix";
import { weightsFromDeviations } from "../lqr/accepted-deviations";
import { gainSlope } from "../lqr/gain-slope";
import { growthFactor } from "../lqr/growth-factor";
import { attempt } from "../plant/attempt";
import type { PlantModel } from "../plant/model";
import type { Part } from "../plant/report";
import { toMatrix } from "../plant/to-matrix";
import type { Summary } from "./evidence";
import { findGain } from "./find-gain";
import { plantMatrices } from "./plant-matrices";
import type { WeightsRecipe } from "./recipe";
import { gainFigures, stepSummary } from "./recipe-figures";

export type WeightEffect = {
  readonly of: "state" | "input";
  readonly index: number;
  /** Predicted with this weight doubled and all others as they are; null where the prediction does not hold the plant. */
  readonly doubled: Summary | null;
};
export type WeightEffects = { readonly now: Summary; readonly effects: readonly WeightEffect[] };

/** A gain follows its weights as a power of them, so that a doubling counts by the slope over the logarithm. */
const LOG_TWO = Math.LN2;

/**
 * What each weight on the diagonal does: the step figures that its doubling is predicted to give, by one Lyapunov solve each.
 *
 * Shapes    those of the plant; one effect for each weight above zero
 * Units     as `Summary`
 * Throws    nothing that user data can cause: where the recipe itself has no gains its refusal is the answer
 * Accuracy  the gain is predicted to first order in the logarithm of the weight; the figures of that gain are exact
 * Source    as `gainSlope`
 */
export function weightEffects(model: PlantModel, recipe: WeightsRecipe): Part<WeightEffects> {
  return attempt(() => {
    const plant = plantMatrices(model);
    const { K, P } = solved(model, recipe, plant);
    const { state, input } = weightMatrices(recipe, model);
    const { A, B } = movedPlant(plant, recipe, model);
    const none = { state: Matrix.zeros(A.rows, A.rows), input: Matrix.zeros(B.columns, B.columns) };
    const effectOf = (of: WeightEffect["of"], index: number, weight: number): WeightEffect => {
      const change = { ...none, [of]: single(none[of].rows, index, weight) };
      const slope = attempt(() =>
        gainSlope({
          ...{ A, B, K, P, inputWeight: input },
          stateChange: change.state,
          inputChange: change.input,
          sampled: model.timeBase.kind === "sampled",
        }),
      );
      const moved = slope.state === "computed" ? Matrix.add(K, Matrix.mul(slope.value, LOG_TWO)) : null;
      return { of, index, doubled: moved && gainFigures(model, plant, moved) };
    };
    const listed = (of: WeightEffect["of"], weights: Matrix) =>
      weights.diag().flatMap((weight, index) => (weight > 0 ? [effectOf(of, index, weight)] : []));
    return { now: stepSummary(model, plant, K), effects: [...listed("state", state), ...listed("input", input)] };
  });
}

function solved(model: PlantModel, recipe: WeightsRecipe, plant: ReturnType<typeof plantMatrices>) {
  const { K, evidence } = findGain(plant, recipe, model.timeBase);
  const n = plant.A.rows;
  return { K, P: evidence.P ? toMatrix("P", evidence.P, n, n) : Matrix.zeros(n, n) };
}

function weightMatrices({ weights }: WeightsRecipe, { states, inputs }: PlantModel): { state: Matrix; input: Matrix } {
  if (weights.form === "deviations") return weightsFromDeviations(weights.states, weights.inputs);
  return {
    state: toMatrix("state weight", weights.state, states.length, states.length),
    input: toMatrix("input weight", weights.input, inputs.length, inputs.length),
  };
}

/** The plant whose Riccati equation a degree of stability solves: see `designLqr`. */
function movedPlant({ A, B }: { A: Matrix; B: Matrix }, { degreeOfStability }: WeightsRecipe, { timeBase }: PlantModel) {
  const alpha = degreeOfStability ?? 0;
  if (alpha === 0) return { A, B };
  if (timeBase.kind === "continuous") return { A: Matrix.add(A, Matrix.eye(A.rows).mul(alpha)), B };
  const growth = growthFactor(alpha * timeBase.period);
  return { A: Matrix.mul(A, growth), B: Matrix.mul(B, growth) };
}

function single(size: number, index: number, value: number): Matrix {
  const M = Matrix.zeros(size, size);
  M.set(index, index, value);
  return M;
}
