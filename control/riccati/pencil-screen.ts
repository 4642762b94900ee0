import type { ComplexVector } from "../linalg/complex";
import type { FlatSchur } from "../linalg/real-schur";
import { workArray } from "../linalg/work-array";
import type { Complex } from "../plant/model";

const ROUNDS = 4;

/** Smallest singular value of [A - λI, B] with its left vector in the basis of the Schur form. */
export type PencilEstimate = { readonly value: number; readonly left: ComplexVector };

/**
 * Estimate from above, rarely by more than a factor two, of the smallest singular value of [A - λI, B]: from the triangular
 * factor of [T - λI, Q'B], T the real Schur form of A, by inverse iteration.
 *
 * Shapes    schur of an n×n A; reached n×m row-major: Q'B
 * Accuracy  absolute error about n ε times the size of the pencil
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, sections 5.2 and 8.6
 */
export function pencilEstimate({ t }: FlatSchur, n: number, reached: Float64Array, m: number, pole: Complex): PencilEstimate {
  const width = n + m;
  const re = workArray(n * width);
  const im = workArray(n * width);
  for (let i = 0; i < n; i++) {
    re.set(t.subarray(i * n, i * n + n), i * width);
    re.set(reached.subarray(i * m, i * m + m), i * width + n);
    re[i * width + i] -= pole.re;
    im[i * width + i] = -pole.im;
  }
  for (let i = n - 1; i >= 0; i--) clearRow(re, im, n, width, i);
  return smallestOfTriangle(re, im, n, width);
}

/** A reflection of columns i - 1 (below which T may have an entry), i and those of B puts all of row i into column i. */
function clearRow(re: Float64Array, im: Float64Array, n: number, width: number, i: number): void {
  const length = width - n + 2;
  const vr = workArray(length);
  const vi = workArray(length);
  const at = i * width;
  for (let k = 0; k < length; k++) {
    const place = at + (k < 2 ? i - k : n + k - 2);
    if (i === 0 && k === 1) continue;
    vr[k] = re[place];
    vi[k] = -im[place];
  }
  let square = 0;
  for (let k = 0; k < length; k++) square += vr[k] * vr[k] + vi[k] * vi[k];
  if (square === 0) return;
  const norm = Math.sqrt(square);
  const first = Math.sqrt(vr[0] * vr[0] + vi[0] * vi[0]);
  const [cr, ci] = first === 0 ? [1, 0] : [vr[0] / first, vi[0] / first];
  vr[0] += cr * norm;
  vi[0] += ci * norm;
  const scale = 1 / (square + norm * first);
  for (let row = 0; row <= i; row++) reflectRow(re, im, row * width, i, n, vr, vi, scale);
}

function reflectRow(
  re: Float64Array,
  im: Float64Array,
  at: number,
  i: number,
  n: number,
  vr: Float64Array,
  vi: Float64Array,
  scale: number,
): void {
  const own = at + i;
  const before = i > 0 ? own - 1 : own;
  const inputs = at + n - 2;
  let sr = re[own] * vr[0] - im[own] * vi[0] + re[before] * vr[1] - im[before] * vi[1];
  let si = re[own] * vi[0] + im[own] * vr[0] + re[before] * vi[1] + im[before] * vr[1];
  for (let k = 2, from = inputs + 2; k < vr.length; k++, from++) {
    sr += re[from] * vr[k] - im[from] * vi[k];
    si += re[from] * vi[k] + im[from] * vr[k];
  }
  sr *= scale;
  si *= scale;
  for (let k = 0, from = own; k < vr.length; k++, from = k === 1 ? before : inputs + k) {
    re[from] -= sr * vr[k] + si * vi[k];
    im[from] -= si * vr[k] - sr * vi[k];
  }
}

/** Of the upper triangular first n columns: 1 / |R⁻*R⁻¹ w| for w from rounds with R R*. */
function smallestOfTriangle(re: Float64Array, im: Float64Array, n: number, width: number): PencilEstimate {
  const wr = Float64Array.from({ length: n }, (_, i) => (i % 3 === 1 ? -1 : 1));
  const wi = workArray(n);
  let least = Number.POSITIVE_INFINITY;
  for (let round = 0; round < ROUNDS; round++) {
    solveUpper(re, im, n, width, wr, wi);
    const grown = unit(wr, wi);
    if (!(grown > 0 && Number.isFinite(grown))) return { value: 0, left: { re: wr.fill(0), im: wi.fill(0) } };
    solveLower(re, im, n, width, wr, wi);
    const back = unit(wr, wi);
    if (!(back > 0 && Number.isFinite(back))) return { value: 0, left: { re: wr.fill(0), im: wi.fill(0) } };
    least = Math.min(least, 1 / back);
  }
  return { value: least, left: { re: wr, im: wi } };
}

function unit(re: Float64Array, im: Float64Array): number {
  let square = 0;
  for (let i = 0; i < re.length; i++) square += re[i] * re[i] + im[i] * im[i];
  const norm = Math.sqrt(square);
  for (let i = 0; i < re.length; i++) {
    re[i] /= norm;
    im[i] /= norm;
  }
  return norm;
}

function solveUpper(re: Float64Array, im: Float64Array, n: number, width: number, x: Float64Array, y: Float64Array): void {
  for (let i = n - 1; i >= 0; i--) {
    let [sr, si] = [x[i], y[i]];
    for (let j = i + 1, at = i * width + i + 1; j < n; j++, at++) {
      sr -= re[at] * x[j] - im[at] * y[j];
      si -= re[at] * y[j] + im[at] * x[j];
    }
    divide(i, sr, si, re[i * width + i], im[i * width + i], x, y);
  }
}

/** The conjugate transpose of the triangle. */
function solveLower(re: Float64Array, im: Float64Array, n: number, width: number, x: Float64Array, y: Float64Array): void {
  for (let i = 0; i < n; i++) {
    divide(i, x[i], y[i], re[i * width + i], -im[i * width + i], x, y);
    for (let j = i + 1, at = i * width + i + 1; j < n; j++, at++) {
      x[j] -= re[at] * x[i] + im[at] * y[i];
      y[j] -= re[at] * y[i] - im[at] * x[i];
    }
  }
}

function divide(i: number, sr: number, si: number, dr: number, di: number, x: Float64Array, y: Float64Array): void {
  const square = dr * dr + di * di;
  x[i] = (sr * dr + si * di) / square;
  y[i] = (si * dr - sr * di) / square;
}
