import { acceleratedFactor, acceleratedSolve } from "../accelerator/accelerated-lu";
import { workArray, workCopy } from "./work-array";

/** P A = L U in one array (unit lower triangle below the diagonal); `zeroPivot` is the first row without a pivot, or -1. */
export type Lu = { readonly lu: Float64Array; readonly rows: Int32Array; readonly n: number; readonly zeroPivot: number };

/**
 * LU factorisation with partial pivoting.
 *
 * Shapes    a n×n row-major, left untouched
 * Accuracy  P (A + E) = L U, |E| ≤ γₙ |L||U|; 2/3 n³ flops
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, section 9
 */
export function factorLu(a: Float64Array, n: number): Lu {
  const lu = workCopy(a);
  const rows = Int32Array.from({ length: n }, (_, i) => i);
  const zeroPivot = acceleratedFactor(lu, rows, n) ?? factorByLoops(lu, rows, n);
  return { lu, rows, n, zeroPivot };
}

/** The reference for the accelerator: overwrites lu and rows and returns the first row without a pivot, or -1. */
export function factorByLoops(lu: Float64Array, rows: Int32Array, n: number): number {
  let zeroPivot = -1;
  for (let k = 0; k < n; k++) {
    let best = k;
    for (let i = k + 1; i < n; i++) if (Math.abs(lu[i * n + k]) > Math.abs(lu[best * n + k])) best = i;
    const pivot = lu[best * n + k];
    if (pivot === 0) {
      if (zeroPivot < 0) zeroPivot = k;
      continue;
    }
    if (best !== k) exchangeRows(lu, rows, n, k, best);
    for (let i = k + 1; i < n; i++) {
      if (lu[i * n + k] === 0) continue;
      const factor = lu[i * n + k] / pivot;
      lu[i * n + k] = factor;
      for (let j = k + 1; j < n; j++) lu[i * n + j] -= factor * lu[k * n + j];
    }
  }
  return zeroPivot;
}

function exchangeRows(lu: Float64Array, rows: Int32Array, n: number, i: number, j: number): void {
  for (let c = 0; c < n; c++) {
    const x = lu[i * n + c];
    lu[i * n + c] = lu[j * n + c];
    lu[j * n + c] = x;
  }
  const row = rows[i];
  rows[i] = rows[j];
  rows[j] = row;
}

/** A⁻¹ B for B n×columns; only after a factorisation without zero pivot. */
export function solveLu({ lu, rows, n }: Lu, b: Float64Array, columns: number): Float64Array {
  const x = workArray(n * columns);
  for (let i = 0; i < n; i++) for (let j = 0; j < columns; j++) x[i * columns + j] = b[rows[i] * columns + j];
  if (columns === 1) solveOneColumn(lu, n, x);
  else if (!acceleratedSolve(lu, n, x, columns)) solveByLoops(lu, n, x, columns);
  return x;
}

/** The reference for the accelerator: overwrites x, whose rows stand in the order of the factors. */
export function solveByLoops(lu: Float64Array, n: number, x: Float64Array, columns: number): void {
  for (let i = 0; i < n; i++) for (let k = 0; k < i; k++) subtractRow(x, columns, i, k, lu[i * n + k]);
  for (let i = n - 1; i >= 0; i--) {
    for (let k = i + 1; k < n; k++) subtractRow(x, columns, i, k, lu[i * n + k]);
    for (let j = 0; j < columns; j++) x[i * columns + j] /= lu[i * n + i];
  }
}

function solveOneColumn(lu: Float64Array, n: number, x: Float64Array): void {
  for (let i = 0; i < n; i++) {
    let sum = x[i];
    for (let k = 0, at = i * n; k < i; k++, at++) if (lu[at] !== 0) sum -= lu[at] * x[k];
    x[i] = sum;
  }
  for (let i = n - 1; i >= 0; i--) {
    let sum = x[i];
    for (let k = i + 1, at = i * n + i + 1; k < n; k++, at++) if (lu[at] !== 0) sum -= lu[at] * x[k];
    x[i] = sum / lu[i * n + i];
  }
}

function subtractRow(x: Float64Array, columns: number, i: number, k: number, factor: number): void {
  if (factor === 0) return;
  const from = k * columns;
  const to = i * columns;
  for (let j = 0; j < columns; j++) x[to + j] -= factor * x[from + j];
}

/** A'⁻¹ b for one right side. */
export function solveLuTransposed({ lu, rows, n }: Lu, b: Float64Array): Float64Array {
  const x = workCopy(b);
  for (let i = 0; i < n; i++) {
    x[i] /= lu[i * n + i];
    for (let j = i + 1; j < n; j++) x[j] -= lu[i * n + j] * x[i];
  }
  for (let i = n - 1; i >= 0; i--) for (let j = 0; j < i; j++) x[j] -= lu[i * n + j] * x[i];
  const y = workArray(n);
  for (let i = 0; i < n; i++) y[rows[i]] = x[i];
  return y;
}

/**
 * Estimate of the 1-norm of A⁻¹ from below, rarely off by more than a factor three.
 *
 * Source    Higham, FORTRAN codes for estimating the one-norm, ACM TOMS 14 (1988) 381-396; at most five rounds
 */
export function inverseOneNorm(factors: Lu): number {
  const { n } = factors;
  let x = workArray(n).fill(1 / n);
  let estimate = 0;
  let last = -1;
  for (let round = 0; round < 5; round++) {
    const y = solveLu(factors, x, 1);
    const norm = y.reduce((sum, entry) => sum + Math.abs(entry), 0);
    if (round > 0 && norm <= estimate) break;
    estimate = norm;
    const z = solveLuTransposed(
      factors,
      y.map((entry) => (entry >= 0 ? 1 : -1)),
    );
    let place = 0;
    for (let i = 1; i < n; i++) if (Math.abs(z[i]) > Math.abs(z[place])) place = i;
    if (place === last) break;
    last = place;
    x = workArray(n);
    x[place] = 1;
  }
  const alternating = Float64Array.from({ length: n }, (_, i) => (i % 2 === 0 ? 1 : -1) * (1 + (n > 1 ? i / (n - 1) : 0)));
  const other = solveLu(factors, alternating, 1).reduce((sum, entry) => sum + Math.abs(entry), 0);
  return Math.max(estimate, (2 * other) / (3 * n));
}
