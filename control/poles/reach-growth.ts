import { Matrix } from "ml-matrix";
import { frobeniusNorm } from "../linalg/norms";
import { orthonormalBasis } from "../linalg/orthogonal";

/**
 * How many directions of the state the inputs reach in one, two, three ... steps: ranks of [B], [B AB], [B AB A²B] ...
 *
 * Shapes    A n×n, B n×m → at most n numbers, the last of them the dimension of all that is reached
 * Units     entries of like size
 * Throws    not-finite; no-convergence
 * Accuracy  each rank against max(n, m) ε of the norm of A beside what was reached before
 * Source    Rosenbrock, State-space and Multivariable Theory, 1970: these ranks are conjugate to the controllability indices
 */
export function reachGrowth(A: Matrix, B: Matrix): number[] {
  const n = A.rows;
  const tolerance = 4 * Math.max(n, B.columns) * Number.EPSILON * (frobeniusNorm(A) || 1);
  let newest = orthonormalBasis(B).range;
  let reached = newest;
  const ranks = [newest.columns];
  while (newest.columns > 0 && reached.columns < n) {
    let next = A.mmul(newest);
    for (let pass = 0; pass < 2; pass++) next = Matrix.sub(next, reached.mmul(reached.transpose().mmul(next)));
    newest = orthonormalBasis(next, tolerance).range;
    if (newest.columns === 0) break;
    const both = Matrix.zeros(n, reached.columns + newest.columns);
    both.setSubMatrix(reached, 0, 0);
    both.setSubMatrix(newest, 0, reached.columns);
    reached = both;
    ranks.push(reached.columns);
  }
  return ranks;
}
