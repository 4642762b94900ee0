import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { flatProduct, fromFlat, toFlat } from "../linalg/flat";
import { requireFinite, requireSquare } from "../linalg/require";
import { balanceDynamics } from "./balance-dynamics";
import { balancedExponential } from "./balanced-exponential";

/**
 * Exponential of a square matrix.
 *
 * Shapes    A n×n → n×n
 * Units     A without unit (a rate times a time)
 * Throws    shape-mismatch; not-finite; too-large when the result, or A beyond 2^300, leaves the range of doubles
 * Accuracy  about n ε times the condition of the exponential; structure of separate blocks kept exactly.
 *           At most 8 products, one solve and log2 of the norm squarings (at most about 310)
 * Source    Al-Mohy & Higham, SIAM J. Matrix Anal. Appl. 31 (2009) 970-989, after balancing by powers of two
 */
export function matrixExponential(A: Matrix): Matrix {
  requireSquare("A", A);
  requireFinite("A", A);
  return fromFlat(flatExponential(toFlat(A), A.rows), A.rows, A.rows);
}

export function flatExponential(a: Float64Array, n: number): Float64Array {
  const { matrix, order, scale } = balanceDynamics(a, n);
  const balanced = balancedExponential(matrix, n);
  const result = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) result[order[i] * n + order[j]] = unscaled(balanced[i * n + j], scale[i], scale[j]);
  }
  for (const entry of result)
    if (!Number.isFinite(entry)) throw new NumericalError("too-large", { what: "exponential", limit: Number.MAX_VALUE });
  return result;
}

/** entry · up / down, in the order that cannot overflow on the way. */
function unscaled(entry: number, up: number, down: number): number {
  return up > 1 === down > 1 ? entry * (up / down) : (entry * up) / down;
}

/** Φ², Φ⁴, ... : `times` squarings. */
export function squared(phi: Float64Array, n: number, times: number): Float64Array {
  let power = phi;
  for (let k = 0; k < times; k++) power = flatProduct(power, power, n, n, n);
  return times === 0 ? phi.slice() : power;
}
