import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { solveLinear } from "../linalg/solve-linear";

/**
 * Relative gain array of a square gain matrix: each entry times the like entry of the transposed inverse.
 * Rows and columns sum to one; scaling of either side does not change it.
 *
 * Shapes    G n×n → n×n
 * Units     none
 * Throws    shape-mismatch; not-finite; singular when G has no inverse within rounding; too-large
 * Accuracy  about n ε times the condition of G after scaling
 * Source    Bristol, IEEE Trans. Automatic Control 11 (1966) 133-134
 */
export function relativeGainArray(G: Matrix): Matrix {
  const n = G.rows;
  const { X: inverse, reciprocalCondition } = solveLinear(G, Matrix.eye(n));
  const array = Matrix.mul(G, inverse.transpose());
  if (!array.to1DArray().every(Number.isFinite))
    throw new NumericalError("too-large", { what: "relative gain", limit: Number.MAX_VALUE });
  // What rounding alone can leave in the place of a zero is a zero.
  const lost = (4 * n * Number.EPSILON) / reciprocalCondition;
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) if (Math.abs(array.get(i, j)) <= lost) array.set(i, j, 0);
  return array;
}
