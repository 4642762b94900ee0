import { balance } from "../linalg/balance";
import { francisIteration } from "../linalg/francis";
import { reduceToHessenberg } from "../linalg/hessenberg";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import { schurValues } from "../linalg/schur-values";
import type { Complex } from "../plant/model";

/**
 * 1 / μ for the eigenvalues μ ≠ 0 of a matrix that was made by inversion: the finite eigenvalues of what was inverted.
 *
 * Shapes    matrix n×n row-major, left untouched → at most n values
 * Throws    no-convergence
 * Accuracy  of μ: c n ε of the balanced matrix
 */
export function invertedValues(matrix: Float64Array, n: number): Complex[] {
  const { matrix: work, shift } = balance(matrix, n);
  reduceToHessenberg(work, n, null);
  francisIteration(work, n, false, null);
  const values: Complex[] = [];
  for (const { re, im } of schurValues(work, n)) {
    const length = re * re + im * im;
    if (length > 0) values.push({ re: timesPowerOfTwo(re / length, shift), im: timesPowerOfTwo(0 - im / length, shift) });
  }
  return values;
}
