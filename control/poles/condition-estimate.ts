import { workArray } from "../linalg/work-array";
import { dotRow, type Frame } from "./eigenvector-frame";

const ROUNDS = 40;

/**
 * 2-norm condition of the columns of a frame, from below, by power iteration on X X' and on its inverse: enough to tell which
 * of two frames is better.
 *
 * Shapes    n×n
 * Units     none
 * Throws    nothing
 * Accuracy  low by a percent or two where singular values lie close together
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.3
 */
export function conditionEstimate({ n, columns, duals }: Frame): number {
  return largestValue(columns, n) * largestValue(duals, n);
}

/** Largest singular value of a matrix given by its rows. */
function largestValue(rows: Float64Array, n: number): number {
  let x = workArray(n);
  let next = workArray(n);
  for (let i = 0; i < n; i++) x[i] = 1 + i / n;
  let value = 0;
  for (let round = 0; round < ROUNDS; round++) {
    const length = Math.sqrt(dotRow(x, 0, x, 0, n));
    next.fill(0);
    let sum = 0;
    for (let i = 0; i < n; i++) {
      const along = dotRow(rows, i * n, x, 0, n) / length;
      sum += along * along;
      for (let k = 0, at = i * n; k < n; k++, at++) next[k] += along * rows[at];
    }
    value = Math.sqrt(sum);
    [x, next] = [next, x];
  }
  return value;
}
