import { NumericalError } from "../errors";
import { flatCholesky, solveCholesky } from "../linalg/cholesky";
import { flatIdentity, flatProduct, flatTransposedProduct } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";
import { workArray, workCopy } from "../linalg/work-array";
import { flatExponential } from "./matrix-exponential";

/** |signal i's departure| ≤ gains[i] · size(departure) now and at every later time. */
export type TailBound = { readonly gains: Float64Array; readonly size: (departure: Float64Array) => number };

const MOST_DOUBLINGS = 64;

/**
 * Bound on all that is still to come of a stable loop: size² = z'P z falls along every free motion, since P sums
 * Φ'Q Φ over all steps (continuous: steps of at most 1/4 over the norm of A, Q by Simpson's rule).
 *
 * Shapes    a n×n, rows of signals (signals×n), period null for continuous
 * Throws    nothing: null when 2^64 steps do not let the motion fade; infinite gains when rounding leaves no bound
 * Accuracy  P to about 1e-6 of itself, ample for a bound that is only compared
 * Source    Smith, SIAM J. Appl. Math. 16 (1968) 198-201 (doubling)
 */
export function tailBound(a: Float64Array, n: number, rows: Float64Array, sampled: boolean): TailBound | null {
  const { first, step } = sampled ? { first: flatIdentity(n), step: a } : continuousStep(a, n);
  const p = doubledSum(first, step, n);
  if (p === null) return null;
  const signals = n === 0 ? 0 : rows.length / n;
  const gains = workArray(signals);
  const l = factorOf(p, n);
  if (l === null) return { gains: gains.fill(Number.POSITIVE_INFINITY), size: () => 1 };
  for (let i = 0; i < signals; i++) {
    const row = rows.slice(i * n, (i + 1) * n);
    const x = solveCholesky(l, n, row, 1);
    let sum = 0;
    for (let k = 0; k < n; k++) sum += row[k] * x[k];
    gains[i] = Math.sqrt(Math.max(0, sum)) * 1.001;
  }
  return { gains, size: (departure) => sizeIn(l, n, departure) };
}

/** Null when rounding leaves P without a factor, in loops whose states differ by more than the digits of a double. */
function factorOf(p: Float64Array, n: number): Float64Array | null {
  try {
    return flatCholesky(p, n, "P");
  } catch (error) {
    if (error instanceof NumericalError) return null;
    throw error;
  }
}

/** |L' z| */
function sizeIn(l: Float64Array, n: number, z: Float64Array): number {
  let sum = 0;
  for (let j = 0; j < n; j++) {
    let entry = 0;
    for (let i = j; i < n; i++) entry += l[i * n + j] * z[i];
    sum += entry * entry;
  }
  return Math.sqrt(sum);
}

function continuousStep(a: Float64Array, n: number): { first: Float64Array; step: Float64Array } {
  const norm = flatOneNorm(a, n);
  const h = norm === 0 ? 1 : powerOfTwo(-exponentOf(norm) - 3);
  const half = flatExponential(
    a.map((entry) => entry * (h / 2)),
    n,
  );
  const step = flatProduct(half, half, n, n, n);
  const middle = flatTransposedProduct(half, half, n, n, n);
  const end = flatTransposedProduct(step, step, n, n, n);
  const first = flatIdentity(n).map((entry, k) => (h / 6) * (entry + 4 * middle[k] + end[k]));
  return { first, step };
}

function doubledSum(first: Float64Array, step: Float64Array, n: number): Float64Array | null {
  const sum = workCopy(first);
  let phi = step;
  for (let k = 0; k < MOST_DOUBLINGS; k++) {
    const later = flatTransposedProduct(phi, flatProduct(sum, phi, n, n, n), n, n, n);
    let largest = 0;
    for (let i = 0; i < sum.length; i++) sum[i] += later[i];
    for (let i = 0; i < n; i++) largest = Math.max(largest, later[i * n + i] / sum[i * n + i]);
    if (!(flatNorm(sum) < Number.MAX_VALUE)) break;
    if (largest < 1e-9 && flatNorm(phi) < 1) return symmetric(sum, n);
    phi = flatProduct(phi, phi, n, n, n);
  }
  return null;
}

function symmetric(p: Float64Array, n: number): Float64Array {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const mean = (p[i * n + j] + p[j * n + i]) / 2;
      p[i * n + j] = mean;
      p[j * n + i] = mean;
    }
  }
  return p;
}
