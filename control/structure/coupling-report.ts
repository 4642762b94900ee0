import { largestEntry } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { PlantModel, Rows } from "../plant/model";
import type { CouplingReport } from "../plant/report";
import type { ScaledPlant } from "../plant/scale-plant";
import { toMatrix, toRows } from "../plant/to-matrix";
import { relativeGainAtRest } from "./relative-gain-at-rest";

/**
 * How strongly the axes act on each other: share of the Frobenius norm of the scaled A in each block, and the relative
 * gain array at rest from inputs to commanded quantities.
 *
 * Shapes    r axes → blocks (r + 1)×(r + 1), row axis acted on by column axis, the last for signals of no axis; array q×q or null
 * Units     none
 * Throws    shape-mismatch; not-finite
 * Accuracy  blocks within a few ε; the array as `relativeGainAtRest`, null where that has none or the plant is not square
 */
export function couplingReport(model: PlantModel, scaled: ScaledPlant): CouplingReport {
  return { blocks: blockShares(model, scaled), ...relativeGains(model, scaled) };
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

type RelativeGains = Pick<CouplingReport, "relativeGain" | "relativeGainBasis">;

function relativeGains(model: PlantModel, { A, B, stateScale, inputScale }: ScaledPlant): RelativeGains {
  const [n, m, q] = [model.states.length, model.inputs.length, model.commanded.length];
  if (q !== m) return { relativeGain: null, relativeGainBasis: "not-square" };
  const H = toMatrix("H", model.H, q, n);
  const J = toMatrix("J", model.J, q, m);
  // Rows of z keep their units: the array does not depend on them.
  for (let k = 0; k < q; k++) {
    for (let j = 0; j < n; j++) H.set(k, j, H.get(k, j) * stateScale[j]);
    for (let j = 0; j < m; j++) J.set(k, j, J.get(k, j) * inputScale[j]);
  }
  const { array, limit } = relativeGainAtRest(A, B, H, J, model.timeBase);
  if (array === null) return { relativeGain: null, relativeGainBasis: "no-limit" };
  return { relativeGain: toRows(array), relativeGainBasis: limit ? "limit" : "at-rest" };
}
