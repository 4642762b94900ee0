import { NumericalError } from "../errors";
import { largestEntry } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { PlantModel, Rows } from "../plant/model";
import type { CouplingReport } from "../plant/report";
import type { ScaledPlant } from "../plant/scale-plant";
import { toMatrix, toRows } from "../plant/to-matrix";
import { gainAtRest } from "./gain-at-rest";
import { relativeGainArray } from "./relative-gain-array";

/**
 * How strongly the axes act on each other: share of the Frobenius norm of the scaled A in each block, and the relative
 * gain array at rest from inputs to commanded quantities.
 *
 * Shapes    r axes → blocks (r + 1)×(r + 1), row axis acted on by column axis, the last for signals of no axis; array q×q or null
 * Units     none
 * Throws    shape-mismatch; not-finite
 * Accuracy  blocks within a few ε; the array is null where the plant has an integrator, is not square or has no inverse
 */
export function couplingReport(model: PlantModel, scaled: ScaledPlant): CouplingReport {
  return { blocks: blockShares(model, scaled), relativeGain: gainArray(model, scaled) };
}

function blockShares(model: PlantModel, { A }: ScaledPlant): Rows {
  const groups = model.axes.length + 1;
  const group = model.states.map(({ axis }) => axis ?? model.axes.length);
  const entries = Array.from({ length: groups * groups }, (): number[] => []);
  // Shares alone are wanted: beside the largest entry no norm overflows.
  const largest = largestEntry(A.to1DArray());
  for (let i = 0; i < A.rows; i++) {
    for (let j = 0; j < A.columns; j++) if (A.get(i, j) !== 0) entries[group[i] * groups + group[j]].push(A.get(i, j) / largest);
  }
  const norms = entries.map((block) => flatNorm(block));
  const whole = flatNorm(norms);
  return Array.from({ length: groups }, (_, row) =>
    norms.slice(row * groups, (row + 1) * groups).map((norm) => (whole === 0 ? 0 : norm / whole)),
  );
}

function gainArray(model: PlantModel, { A, B, stateScale, inputScale }: ScaledPlant): Rows | null {
  const [n, m, q] = [model.states.length, model.inputs.length, model.commanded.length];
  if (q !== m) return null;
  const H = toMatrix("H", model.H, q, n);
  const J = toMatrix("J", model.J, q, m);
  // Rows of z keep their units: the array does not depend on them.
  for (let k = 0; k < q; k++) {
    for (let j = 0; j < n; j++) H.set(k, j, H.get(k, j) * stateScale[j]);
    for (let j = 0; j < m; j++) J.set(k, j, J.get(k, j) * inputScale[j]);
  }
  try {
    return toRows(relativeGainArray(gainAtRest(A, B, H, J, model.timeBase)));
  } catch (error) {
    if (error instanceof NumericalError && (error.code === "singular" || error.code === "too-large")) return null;
    throw error;
  }
}
