import { pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Complex } from "../plant/model";
import type { BandedPair } from "./banded-pair";

/** Smallest singular value of [B, A - s I], and u* A u for the unit u with |u* [B, A - s I]| = value. */
export type SmallestSingular = { readonly value: number; readonly rayleigh: Complex };

const MOST_STEPS = 60;
const CONTRACTED = 1e-12;

/**
 * Smallest singular value of [B, A - s I] for one s after another: a banded elimination, then inverse iteration.
 *
 * Shapes    a pair in trapezoid form, with entries of the size of 1
 * Accuracy  n ε of the norm; between the two smallest where these agree to twelve digits; n² m + 60 n² complex flops at most
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, algorithm 5.2.1 and section 8.2.2
 */
export function smallestSingular(pair: BandedPair): (s: Complex) => SmallestSingular {
  const { n, m, a } = pair;
  const width = n + m;
  const re = new Float64Array(n * width);
  const im = new Float64Array(n * width);
  const norm = pythagoras(flatNorm(pair.a), flatNorm(pair.b));
  const x = new Float64Array(n);
  const y = new Float64Array(n);
  return (s) => {
    load(pair, s, re, im);
    const size = norm + pythagoras(s.re, s.im);
    for (let i = n - 1; i >= 0; i--) eliminate(re, im, width, i, m);
    const floor = (size || 1) * Number.EPSILON * 0.0625;
    for (let i = 0; i < n; i++) {
      const at = i * width + i + m;
      if (pythagoras(re[at], im[at]) >= floor) continue;
      re[at] = floor;
      im[at] = 0;
    }
    for (let k = 0; k < n; k++) {
      x[k] = 1 + ((k * 7) % 5) / 8 + k / (2 * n);
      y[k] = ((k * 3) % 7) / 16;
    }
    const value = iterate(re, im, width, m, x, y, size);
    return { value, rayleigh: rayleigh(a, n, x, y) };
  };
}

/** Rows of [B, A - s I], conjugated. */
function load({ n, m, a, b }: BandedPair, s: Complex, re: Float64Array, im: Float64Array): void {
  const width = n + m;
  im.fill(0);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < m; j++) re[i * width + j] = b[i * m + j];
    for (let j = 0; j < n; j++) re[i * width + m + j] = a[i * n + j];
    re[i * width + m + i] -= s.re;
    im[i * width + m + i] = s.im;
  }
}

/** One reflection of columns i … i + m after which row i holds only its last entry of them; rows above go with it. */
function eliminate(re: Float64Array, im: Float64Array, width: number, i: number, m: number): void {
  const row = i * width + i;
  const last = row + m;
  let largest = 0;
  for (let k = row; k <= last; k++) largest = Math.max(largest, Math.abs(re[k]), Math.abs(im[k]));
  if (largest < 1e-140) {
    re.fill(0, row, last + 1);
    im.fill(0, row, last + 1);
    return;
  }
  let square = 0;
  for (let k = row; k <= last; k++) square += re[k] * re[k] + im[k] * im[k];
  const length = Math.sqrt(square);
  const size = pythagoras(re[last], im[last]);
  const phaseRe = size === 0 ? 1 : re[last] / size;
  const phaseIm = size === 0 ? 0 : im[last] / size;
  re[last] += phaseRe * length;
  im[last] += phaseIm * length;
  const beta = 1 / (length * (length + size));
  for (let j = 0; j < i; j++) {
    const shift = (j - i) * width;
    let sumRe = 0;
    let sumIm = 0;
    for (let k = row; k <= last; k++) {
      sumRe += re[k] * re[k + shift] + im[k] * im[k + shift];
      sumIm += re[k] * im[k + shift] - im[k] * re[k + shift];
    }
    sumRe *= beta;
    sumIm *= beta;
    for (let k = row; k <= last; k++) {
      re[k + shift] -= sumRe * re[k] - sumIm * im[k];
      im[k + shift] -= sumRe * im[k] + sumIm * re[k];
    }
  }
  re.fill(0, row, last);
  im.fill(0, row, last);
  re[last] = -phaseRe * length;
  im[last] = -phaseIm * length;
}

/** Inverse iteration with R R*, R upper triangular in the last n columns (stored conjugated); x + i y becomes u. */
function iterate(
  re: Float64Array,
  im: Float64Array,
  width: number,
  m: number,
  x: Float64Array,
  y: Float64Array,
  norm: number,
): number {
  let value = Number.POSITIVE_INFINITY;
  for (let step = 0; step < MOST_STEPS; step++) {
    normalise(x, y);
    solveUpper(re, im, width, m, x, y);
    normalise(x, y);
    const grown = solveAdjoint(re, im, width, m, x, y);
    // For a unit right side the solution of R* x = z grows to 1 / σ in the end.
    const next = grown > 0 ? 1 / grown : 0;
    const settled = Math.abs(value - next) <= CONTRACTED * next || next <= norm * Number.EPSILON;
    value = next;
    if (settled) break;
  }
  normalise(x, y);
  return value;
}

function normalise(x: Float64Array, y: Float64Array): void {
  const length = pythagoras(flatNorm(x), flatNorm(y));
  for (let k = 0; k < x.length; k++) {
    x[k] /= length;
    y[k] /= length;
  }
}

/** R z = u in place, R = conj of what is stored. */
function solveUpper(re: Float64Array, im: Float64Array, width: number, m: number, x: Float64Array, y: Float64Array): void {
  for (let i = x.length - 1; i >= 0; i--) {
    const at = i * width + m;
    let sumRe = x[i];
    let sumIm = y[i];
    for (let j = i + 1; j < x.length; j++) {
      sumRe -= re[at + j] * x[j] + im[at + j] * y[j];
      sumIm -= re[at + j] * y[j] - im[at + j] * x[j];
    }
    divide(x, y, i, sumRe, sumIm, re[at + i], -im[at + i]);
  }
}

/** R* x = z in place; returns the length of x. */
function solveAdjoint(re: Float64Array, im: Float64Array, width: number, m: number, x: Float64Array, y: Float64Array): number {
  for (let i = 0; i < x.length; i++) {
    const at = i * width + m;
    divide(x, y, i, x[i], y[i], re[at + i], im[at + i]);
    for (let j = i + 1; j < x.length; j++) {
      x[j] -= re[at + j] * x[i] - im[at + j] * y[i];
      y[j] -= re[at + j] * y[i] + im[at + j] * x[i];
    }
  }
  return pythagoras(flatNorm(x), flatNorm(y));
}

function divide(x: Float64Array, y: Float64Array, k: number, re: number, im: number, byRe: number, byIm: number): void {
  const square = byRe * byRe + byIm * byIm;
  x[k] = (re * byRe + im * byIm) / square;
  y[k] = (im * byRe - re * byIm) / square;
}

/** u* A u */
function rayleigh(a: Float64Array, n: number, x: Float64Array, y: Float64Array): Complex {
  let re = 0;
  let im = 0;
  for (let i = 0; i < n; i++) {
    let sumRe = 0;
    let sumIm = 0;
    for (let j = 0; j < n; j++) {
      sumRe += a[i * n + j] * x[j];
      sumIm += a[i * n + j] * y[j];
    }
    re += x[i] * sumRe + y[i] * sumIm;
    im += x[i] * sumIm - y[i] * sumRe;
  }
  return { re, im };
}
