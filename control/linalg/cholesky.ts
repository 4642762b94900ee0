import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { fromFlat, toFlat } from "./flat";
import { requireFinite, requireSymmetric } from "./require";
import { workArray, workCopy } from "./work-array";

/**
 * Lower triangular L with M = L L' for a symmetric positive definite M.
 *
 * Shapes    M n×n → L n×n
 * Units     square root of those of M
 * Throws    shape-mismatch; not-finite; not-symmetric; not-positive-definite with the index of the first pivot that is not
 *           above 4 n ε of its diagonal entry
 * Accuracy  M + E = L L', |E| ≤ γₙ |L||L'| (Higham 2002, theorem 10.3)
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, algorithm 4.2.1
 */
export function cholesky(M: Matrix, name = "M"): Matrix {
  requireFinite(name, M);
  requireSymmetric(name, M);
  const n = M.rows;
  return fromFlat(flatCholesky(toFlat(M), n, name), n, n);
}

export function flatCholesky(m: Float64Array, n: number, name: string): Float64Array {
  const l = workArray(n * n);
  for (let j = 0; j < n; j++) {
    let pivot = m[j * n + j];
    for (let k = 0; k < j; k++) pivot -= l[j * n + k] * l[j * n + k];
    if (!(pivot > 4 * n * Number.EPSILON * Math.abs(m[j * n + j]))) {
      throw new NumericalError("not-positive-definite", { matrix: name, index: j });
    }
    const root = Math.sqrt(pivot);
    l[j * n + j] = root;
    for (let i = j + 1; i < n; i++) {
      let sum = m[i * n + j];
      for (let k = 0; k < j; k++) sum -= l[i * n + k] * l[j * n + k];
      l[i * n + j] = sum / root;
    }
  }
  return l;
}

/** M⁻¹ b from the factor of M, for b n×columns. */
export function solveCholesky(l: Float64Array, n: number, b: Float64Array, columns: number): Float64Array {
  const x = workCopy(b);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < columns; j++) {
      let sum = x[i * columns + j];
      for (let k = 0; k < i; k++) sum -= l[i * n + k] * x[k * columns + j];
      x[i * columns + j] = sum / l[i * n + i];
    }
  }
  for (let i = n - 1; i >= 0; i--) {
    for (let j = 0; j < columns; j++) {
      let sum = x[i * columns + j];
      for (let k = i + 1; k < n; k++) sum -= l[k * n + i] * x[k * columns + j];
      x[i * columns + j] = sum / l[i * n + i];
    }
  }
  return x;
}
