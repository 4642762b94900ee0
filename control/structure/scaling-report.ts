import type { Matrix } from "ml-matrix";
import type { PlantModel, Rows } from "../plant/model";
import type { ScalingReport } from "../plant/report";
import type { ScaledPlant } from "../plant/scale-plant";

/** Beyond this half of the digits of a double are gone before any computation starts. */
const WIDE_SPREAD = 1 / Math.sqrt(Number.EPSILON);

/** Spread of the entries of A, B and C before and after scaling, and the signals whose deviation had to be assumed. */
export function scalingReport(model: PlantModel, scaled: ScaledPlant): ScalingReport {
  const spreadScaled = spreadOf([scaled.A, scaled.B, scaled.C].map((M: Matrix) => M.to2DArray()));
  return {
    spreadAsGiven: spreadOf([model.A, model.B, model.C]),
    spreadScaled,
    caution: spreadScaled > WIDE_SPREAD,
    assumedStates: scaled.assumedStates,
    assumedInputs: scaled.assumedInputs,
    assumedOutputs: scaled.assumedOutputs,
  };
}

/** Largest over smallest nonzero entry, one where there is none, at most the largest double. */
function spreadOf(matrices: readonly Rows[]): number {
  let largest = 0;
  let smallest = Number.POSITIVE_INFINITY;
  for (const rows of matrices) {
    for (const entry of rows.flat()) {
      if (entry === 0) continue;
      const size = Math.abs(entry);
      if (size > largest) largest = size;
      if (size < smallest) smallest = size;
    }
  }
  if (largest === 0) return 1;
  const spread = largest / smallest;
  return Number.isFinite(spread) ? spread : Number.MAX_VALUE;
}
