import { acceleratedHessenberg } from "../accelerator/accelerated-schur";
import { workArray } from "./work-array";

/**
 * Reduces h to upper Hessenberg form by orthogonal similarity, in place.
 *
 * Shapes    h n×n row-major, overwritten; qt n×n or null: its rows are multiplied by the same reflections (h_old = q h_new qt)
 * Accuracy  backward stable; existing zeros of a block triangular matrix stay exact; 10/3 n³ flops
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, algorithm 7.4.2
 */
export function reduceToHessenberg(h: Float64Array, n: number, qt: Float64Array | null): void {
  if (!acceleratedHessenberg(h, n, qt)) hessenbergByLoops(h, n, qt);
}

/** The reference for the accelerator: sums over rows in order, sums along a row as those of even and of odd places. */
export function hessenbergByLoops(h: Float64Array, n: number, qt: Float64Array | null): void {
  const v = workArray(n);
  const sums = workArray(n);
  for (let k = 0; k < n - 2; k++) {
    const beta = reflectorOfColumn(h, n, k, v);
    if (beta === 0) continue;
    reflectRows(h, n, k + 1, k, v, beta, sums);
    reflectColumns(h, n, k + 1, v, beta);
    if (qt) reflectRows(qt, n, k + 1, 0, v, beta, sums);
    for (let i = k + 2; i < n; i++) h[i * n + k] = 0;
  }
}

/** v and beta with (I - beta v v') mapping column k below the diagonal onto its first entry; 0 when nothing is to be done. */
function reflectorOfColumn(h: Float64Array, n: number, k: number, v: Float64Array): number {
  let below = 0;
  for (let i = k + 2; i < n; i++) below = Math.max(below, Math.abs(h[i * n + k]));
  if (below === 0) return 0;
  const scale = Math.max(below, Math.abs(h[(k + 1) * n + k]));
  let sum = 0;
  for (let i = k + 1; i < n; i++) {
    v[i] = h[i * n + k] / scale;
    sum += v[i] * v[i];
  }
  const length = Math.sqrt(sum);
  v[k + 1] += v[k + 1] >= 0 ? length : -length;
  let square = 0;
  for (let i = k + 1; i < n; i++) square += v[i] * v[i];
  return 2 / square;
}

function reflectRows(
  h: Float64Array,
  n: number,
  first: number,
  column: number,
  v: Float64Array,
  beta: number,
  sums: Float64Array,
): void {
  sums.fill(0);
  for (let i = first; i < n; i++) {
    const factor = v[i];
    for (let j = column, at = i * n + column; j < n; j++, at++) sums[j] += factor * h[at];
  }
  for (let i = first; i < n; i++) {
    const factor = beta * v[i];
    for (let j = column, at = i * n + column; j < n; j++, at++) h[at] -= factor * sums[j];
  }
}

function reflectColumns(h: Float64Array, n: number, first: number, v: Float64Array, beta: number): void {
  for (let i = 0; i < n; i++) {
    const at = i * n;
    let even = 0;
    let odd = 0;
    let j = first;
    for (; j < n - 1; j += 2) {
      even += h[at + j] * v[j];
      odd += h[at + j + 1] * v[j + 1];
    }
    if (j < n) even += h[at + j] * v[j];
    const factor = (even + odd) * beta;
    for (j = first; j < n; j++) h[at + j] -= factor * v[j];
  }
}
