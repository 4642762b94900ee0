import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import type { ComplexMatrix } from "./complex";
import { fromFlat, toFlat } from "./flat";
import { factorLu, inverseOneNorm, solveLu } from "./lu";
import { exponentOf, powerOfTwo } from "./power-of-two";
import { requireFinite, requireShape, requireSquare } from "./require";
import { workArray, workCopy } from "./work-array";

/**
 * Solves A X = B after scaling rows and columns of A by powers of two, so that units do not count as bad condition.
 *
 * Shapes    A n×n, B n×k → X n×k
 * Units     [X] = [B] / [A]
 * Throws    shape-mismatch; not-finite; singular with the row of the zero pivot, or the last row when 1 / condition < ε;
 *           too-large when an entry of X is beyond the largest double
 * Accuracy  relative error about n ε / reciprocalCondition (1-norm, of the scaled A; an estimate from above)
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, sections 9 and 15
 */
export function solveLinear(A: Matrix, B: Matrix): { X: Matrix; reciprocalCondition: number } {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  const n = A.rows;
  const columns = B.columns;
  const { x, reciprocalCondition } = solveFlat(toFlat(A), n, toFlat(B), columns);
  return { X: fromFlat(x, n, columns), reciprocalCondition };
}

/** The same for finite row-major entries; a and b are left untouched. */
export function solveFlat(
  a: Float64Array,
  n: number,
  b: Float64Array,
  columns: number,
): { x: Float64Array; reciprocalCondition: number } {
  const { scaled, rows, cols } = equilibrate(a, n);
  const factors = factorLu(scaled, n);
  if (factors.zeroPivot >= 0) throw new NumericalError("singular", { matrix: "A", row: factors.zeroPivot });
  const reciprocalCondition = n === 0 ? 1 : 1 / (flatOneNorm(scaled, n) * inverseOneNorm(factors));
  if (!(reciprocalCondition >= Number.EPSILON)) throw new NumericalError("singular", { matrix: "A", row: n - 1 });
  const right = workCopy(b);
  for (let i = 0; i < n; i++) for (let j = 0; j < columns; j++) right[i * columns + j] *= rows[i];
  const x = solveLu(factors, right, columns);
  for (let i = 0; i < n; i++) for (let j = 0; j < columns; j++) x[i * columns + j] *= cols[i];
  if (!x.every(Number.isFinite)) throw new NumericalError("too-large", { what: "solution", limit: Number.MAX_VALUE });
  return { x, reciprocalCondition };
}

/** The same for complex A and B, by their real form of twice the size. */
export function solveComplex(A: ComplexMatrix, B: ComplexMatrix): { X: ComplexMatrix; reciprocalCondition: number } {
  const n = A.re.rows;
  requireShape("A", A.im, n, A.re.columns);
  requireShape("B", B.im, B.re.rows, B.re.columns);
  const { X, reciprocalCondition } = solveLinear(stack(A.re, A.im, true), stack(B.re, B.im, false));
  const half = X.columns;
  return {
    X: { re: X.subMatrix(0, n - 1, 0, half - 1), im: X.subMatrix(n, 2 * n - 1, 0, half - 1) },
    reciprocalCondition,
  };
}

/** [re -im; im re], or its first block column. */
function stack(re: Matrix, im: Matrix, square: boolean): Matrix {
  const { rows, columns } = re;
  const whole = Matrix.zeros(2 * rows, square ? 2 * columns : columns);
  whole.setSubMatrix(re, 0, 0);
  whole.setSubMatrix(im, rows, 0);
  if (square) {
    whole.setSubMatrix(Matrix.mul(im, -1), 0, columns);
    whole.setSubMatrix(re, rows, columns);
  }
  return whole;
}

/** Rows, then columns, brought to largest entry in [1, 2) by powers of two. */
function equilibrate(a: Float64Array, n: number): { scaled: Float64Array; rows: Float64Array; cols: Float64Array } {
  const scaled = workCopy(a);
  const rows = workArray(n).fill(1);
  const cols = workArray(n).fill(1);
  for (let i = 0; i < n; i++) {
    let largest = 0;
    for (let j = 0; j < n; j++) largest = Math.max(largest, Math.abs(scaled[i * n + j]));
    if (largest === 0) continue;
    rows[i] = powerOfTwo(-exponentOf(largest));
    for (let j = 0; j < n; j++) scaled[i * n + j] *= rows[i];
  }
  for (let j = 0; j < n; j++) {
    let largest = 0;
    for (let i = 0; i < n; i++) largest = Math.max(largest, Math.abs(scaled[i * n + j]));
    if (largest === 0) continue;
    cols[j] = powerOfTwo(-exponentOf(largest));
    for (let i = 0; i < n; i++) scaled[i * n + j] *= cols[j];
  }
  return { scaled, rows, cols };
}

export function flatOneNorm(a: Float64Array, n: number): number {
  let norm = 0;
  for (let j = 0; j < n; j++) {
    let sum = 0;
    for (let i = 0; i < n; i++) sum += Math.abs(a[i * n + j]);
    norm = Math.max(norm, sum);
  }
  return norm;
}
