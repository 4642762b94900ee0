import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { rightEigensystem } from "../linalg/eigensystem";
import { eigenvalues } from "../linalg/eigenvalues";
import { weightsFromDeviations } from "../lqr/accepted-deviations";
import { designLqr } from "../lqr/design-lqr";
import type { Complex, TimeBase } from "../plant/model";
import { toMatrix, toRows } from "../plant/to-matrix";
import { placePoles } from "../poles/place-poles";
import { isStablePole, requireStablePoles } from "../poles/require-stable-poles";
import { resolvePoles } from "../poles/resolve-poles";
import type { GainEvidence } from "./evidence";
import type { PlantMatrices } from "./plant-matrices";
import type { PolesRecipe, Recipe, WeightsRecipe } from "./recipe";
import { eigenvectorCondition } from "./report-poles";

export type FoundGain = {
  readonly K: Matrix;
  readonly closed: Matrix;
  /** Eigenvalues of `closed`. */
  readonly poles: readonly Complex[];
  readonly evidence: GainEvidence;
};

/**
 * Gain K of u = -K x by the recipe's method, verified to stabilise.
 *
 * Throws    as `designLqr`, `placePoles`, `resolvePoles`, `weightsFromDeviations`; unstable-pole; not-stabilising { pole }
 * Accuracy  as those
 */
export function findGain(plant: PlantMatrices, recipe: Recipe, timeBase: TimeBase): FoundGain {
  const found = recipe.method === "weights" ? byWeights(plant, recipe, timeBase) : byPoles(plant, recipe, timeBase);
  requireInside(found.poles, timeBase);
  return found;
}

/** The eigenvalues of dynamics; throws not-stabilising with the first one that is not inside the stability boundary. */
export function stablePolesOf(dynamics: Matrix, timeBase: TimeBase): Complex[] {
  const poles = dynamics.rows === 0 ? [] : eigenvalues(dynamics);
  requireInside(poles, timeBase);
  return poles;
}

function requireInside(poles: readonly Complex[], timeBase: TimeBase): void {
  const pole = poles.find((value) => !isStablePole(value, timeBase.kind === "sampled"));
  if (pole) throw new NumericalError("not-stabilising", { pole });
}

function byWeights({ A, B }: PlantMatrices, recipe: WeightsRecipe, timeBase: TimeBase): FoundGain {
  const n = A.rows;
  const m = B.columns;
  const { weights } = recipe;
  if (weights.form === "deviations") requireCounts(weights.states.length, n, weights.inputs.length, m);
  const { state, input } =
    weights.form === "deviations"
      ? weightsFromDeviations(weights.states, weights.inputs)
      : { state: toMatrix("state weight", weights.state, n, n), input: toMatrix("input weight", weights.input, m, m) };
  const found = designLqr({
    A,
    B,
    stateWeight: state,
    inputWeight: input,
    crossWeight: recipe.crossWeight ? toMatrix("cross weight", recipe.crossWeight, n, m) : undefined,
    degreeOfStability: recipe.degreeOfStability ?? undefined,
    timeBase,
  });
  const { K, X, residual, bound, errorBound, method } = found;
  const closed = Matrix.sub(A, B.mmul(K));
  const spectrum = rightEigensystem(closed);
  const evidence = {
    K: toRows(K),
    method,
    residual,
    bound,
    errorBound,
    P: toRows(X),
    eigenvectorCondition: eigenvectorCondition(spectrum),
    poleError: null,
  };
  return { K, closed, poles: spectrum.values, evidence };
}

function requireCounts(states: number, n: number, inputs: number, m: number): void {
  if (states !== n || inputs !== m)
    throw new NumericalError("shape-mismatch", { what: "weights", expected: [n, m], given: [states, inputs] });
}

function byPoles({ A, B }: PlantMatrices, recipe: PolesRecipe, timeBase: TimeBase): FoundGain {
  const poles = resolvePoles(recipe.poles, timeBase);
  requireStablePoles(poles, timeBase);
  const { K, method, residual, bound, conditioning, poleError, poleShiftPerGainDigit, gainNorm } = placePoles({
    A,
    B,
    poles,
    allowDefective: recipe.allowDefective,
  });
  const closed = Matrix.sub(A, B.mmul(K));
  return {
    K,
    closed,
    poles: eigenvalues(closed),
    evidence: {
      K: toRows(K),
      method,
      residual,
      bound,
      errorBound: null,
      P: null,
      eigenvectorCondition: conditioning,
      poleError,
      poleShiftPerGainDigit,
      gainNorm,
    },
  };
}
