import { largestEntry, pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import type { Complex } from "../plant/model";

export type ModeDistance = {
  /** Smallest singular value of [A - λ I, B] over its Frobenius norm. */
  readonly relative: number;
  /** That norm over the norm of [A B], for tolerances that belong to the pair. */
  readonly normRatio: number;
  /** Unit u with |u* [A - λ I, B]| = smallest singular value. */
  readonly re: Float64Array;
  readonly im: Float64Array;
};

const MOST_STEPS = 100;
/** ε⁴ */
const NEGLIGIBLE = Number.EPSILON * Number.EPSILON * Number.EPSILON * Number.EPSILON;

/**
 * How far a pair is from one in which no input reaches the mode λ (Popov, Belevitch and Hautus).
 *
 * Shapes    a n×n, b n×m, row-major
 * Accuracy  n ε of the norm; between the two smallest singular values where these agree to ten digits; 100 steps at most
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, algorithm 5.2.1 and inverse iteration of section 8.2.2
 */
export function modeDistance(a: Float64Array, b: Float64Array, n: number, m: number, pole: Complex): ModeDistance {
  const { re, im, normRatio } = conjugatedRows(a, b, n, m, pole);
  const norm = flatNorm([...re, ...im].map(flatNorm));
  for (let k = 0; k < n; k++) eliminate(re, im, k);
  const { value, u, w } = smallestByInverseIteration(re, im, n, norm);
  return { relative: norm === 0 ? 0 : value / norm, normRatio, re: u, im: w };
}

/** Rows of [A - λ I, B], conjugated and brought to the size of 1, with the ratio of its norm to that of [A B]. */
function conjugatedRows(a: Float64Array, b: Float64Array, n: number, m: number, pole: Complex) {
  const factor = unitFactor(Math.max(largestEntry(a), largestEntry(b), Math.abs(pole.re), Math.abs(pole.im)));
  const re = Array.from({ length: n }, () => workArray(n + m));
  const im = Array.from({ length: n }, () => workArray(n + m));
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) re[i][j] = a[i * n + j] * factor;
    for (let j = 0; j < m; j++) re[i][n + j] = b[i * m + j] * factor;
  }
  const pairNorm = flatNorm(re.map(flatNorm));
  for (let i = 0; i < n; i++) {
    re[i][i] -= pole.re * factor;
    im[i][i] = pole.im * factor;
  }
  const norm = flatNorm([...re, ...im].map(flatNorm));
  const own = unitFactor(Math.max(...[...re, ...im].map(largestEntry)));
  for (const row of [...re, ...im]) for (let j = 0; j < row.length; j++) row[j] *= own;
  return { re, im, normRatio: pairNorm === 0 ? 1 : norm / pairNorm };
}

function unitFactor(largest: number): number {
  return largest === 0 ? 1 : powerOfTwo(-exponentOf(largest));
}

/** One Householder step on the conjugated rows: afterwards entry j > k of row k is gone. Row i ends as column i of R. */
function eliminate(re: Float64Array[], im: Float64Array[], k: number): void {
  const x = re[k];
  const y = im[k];
  const length = pythagoras(flatNorm(x.subarray(k)), flatNorm(y.subarray(k)));
  // The whole matrix has the size of 1: squares of anything as small as this would underflow, and it counts as zero.
  if (length < NEGLIGIBLE) {
    x.fill(0, k);
    y.fill(0, k);
    return;
  }
  const size = pythagoras(x[k], y[k]);
  const phaseRe = size === 0 ? 1 : x[k] / size;
  const phaseIm = size === 0 ? 0 : y[k] / size;
  x[k] += phaseRe * length;
  y[k] += phaseIm * length;
  const beta = 1 / (length * (length + size));
  for (let i = k + 1; i < re.length; i++) {
    const p = re[i];
    const q = im[i];
    let sumRe = 0;
    let sumIm = 0;
    for (let j = k; j < x.length; j++) {
      sumRe += x[j] * p[j] + y[j] * q[j];
      sumIm += x[j] * q[j] - y[j] * p[j];
    }
    sumRe *= beta;
    sumIm *= beta;
    for (let j = k; j < x.length; j++) {
      p[j] -= sumRe * x[j] - sumIm * y[j];
      q[j] -= sumRe * y[j] + sumIm * x[j];
    }
  }
  x[k] = -phaseRe * length;
  y[k] = -phaseIm * length;
}

/** R is upper triangular with R(k, j) = row j, entry k. */
function smallestByInverseIteration(re: Float64Array[], im: Float64Array[], n: number, norm: number) {
  const floor = norm === 0 ? 1 : norm * Number.EPSILON * 0.0625;
  for (let k = 0; k < n; k++) {
    if (pythagoras(re[k][k], im[k][k]) >= floor) continue;
    re[k][k] = floor;
    im[k][k] = 0;
  }
  // Uneven start, so that a symmetric or antisymmetric shape is not missed.
  const u = Float64Array.from({ length: n }, (_, k) => 1 + ((k * 7) % 5) / 8 + k / (2 * n));
  const w = workArray(n);
  normalise(u, w);
  let value = Number.POSITIVE_INFINITY;
  for (let step = 0; step < MOST_STEPS; step++) {
    solveTransposed(re, im, u, w);
    normalise(u, w);
    solveUpper(re, im, u, w);
    normalise(u, w);
    const next = lengthOfProduct(re, im, u, w);
    const settled = Math.abs(value - next) <= 1e-11 * next || next <= norm * Number.EPSILON;
    value = next;
    if (settled) break;
  }
  return { value, u, w };
}

function normalise(u: Float64Array, w: Float64Array): void {
  const length = pythagoras(flatNorm(u), flatNorm(w));
  for (let k = 0; k < u.length; k++) {
    u[k] /= length;
    w[k] /= length;
  }
}

/** R* y = x, in place. */
function solveTransposed(re: Float64Array[], im: Float64Array[], x: Float64Array, y: Float64Array): void {
  for (let k = 0; k < x.length; k++) {
    const p = re[k];
    const q = im[k];
    let sumRe = x[k];
    let sumIm = y[k];
    for (let j = 0; j < k; j++) {
      sumRe -= p[j] * x[j] + q[j] * y[j];
      sumIm -= p[j] * y[j] - q[j] * x[j];
    }
    divide(x, y, k, sumRe, sumIm, p[k], -q[k]);
  }
}

/** R y = x, in place; column by column. */
function solveUpper(re: Float64Array[], im: Float64Array[], x: Float64Array, y: Float64Array): void {
  for (let k = x.length - 1; k >= 0; k--) {
    const p = re[k];
    const q = im[k];
    divide(x, y, k, x[k], y[k], p[k], q[k]);
    const u = x[k];
    const w = y[k];
    for (let j = 0; j < k; j++) {
      x[j] -= p[j] * u - q[j] * w;
      y[j] -= p[j] * w + q[j] * u;
    }
  }
}

function divide(x: Float64Array, y: Float64Array, k: number, re: number, im: number, byRe: number, byIm: number): void {
  const square = byRe * byRe + byIm * byIm;
  x[k] = (re * byRe + im * byIm) / square;
  y[k] = (im * byRe - re * byIm) / square;
}

function lengthOfProduct(re: Float64Array[], im: Float64Array[], u: Float64Array, w: Float64Array): number {
  const n = u.length;
  const x = workArray(n);
  const y = workArray(n);
  for (let k = 0; k < n; k++) {
    const p = re[k];
    const q = im[k];
    const s = u[k];
    const t = w[k];
    for (let j = 0; j <= k; j++) {
      x[j] += p[j] * s - q[j] * t;
      y[j] += p[j] * t + q[j] * s;
    }
  }
  return pythagoras(flatNorm(x), flatNorm(y));
}
