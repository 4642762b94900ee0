import { workArray, workCopy } from "../linalg/work-array";
/** Complex vectors of one length, stored one after another. */
export type ComplexVectors = {
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly count: number;
  readonly length: number;
};

/**
 * Orthonormal basis of all vectors orthogonal to the given ones, by Householder steps with column pivoting.
 * Real vectors give an exactly real basis.
 *
 * Shapes    `count` vectors of `length` entries → length - rank vectors of that length
 * Units     tolerance in the unit of the entries: what is left below it counts as zero
 * Throws    nothing: finite entries that can be squared are the caller's duty
 * Accuracy  orthonormal to c n ε, and orthogonal to vectors within c n ε of those given
 * Source    Businger & Golub, Numer. Math. 7 (1965) 269-276
 */
export function complementBasis(given: ComplexVectors, tolerance: number): ComplexVectors {
  const { count, length } = given;
  const re = workCopy(given.re);
  const im = workCopy(given.im);
  const steps = Math.min(count, length);
  let rank = 0;
  for (; rank < steps; rank++) {
    const { column, size } = longestBelow(re, im, count, length, rank);
    if (!(size > tolerance)) break;
    swapVectors(re, im, length, rank, column);
    makeReflector(re, im, rank * length, rank, length, size);
    for (let c = rank + 1; c < count; c++) reflect(re, im, rank * length, re, im, c * length, rank, length);
  }
  const free = length - rank;
  const out = { re: workArray(free * length), im: workArray(free * length), count: free, length };
  for (let c = 0; c < free; c++) {
    const at = c * length;
    out.re[at + rank + c] = 1;
    for (let k = rank - 1; k >= 0; k--) reflect(re, im, k * length, out.re, out.im, at, k, length);
  }
  return out;
}

function longestBelow(re: Float64Array, im: Float64Array, count: number, length: number, row: number) {
  let column = row;
  let largest = 0;
  for (let c = row; c < count; c++) {
    let sum = 0;
    for (let i = c * length + row; i < (c + 1) * length; i++) sum += re[i] * re[i] + im[i] * im[i];
    if (sum > largest) {
      largest = sum;
      column = c;
    }
  }
  return { column, size: Math.sqrt(largest) };
}

function swapVectors(re: Float64Array, im: Float64Array, length: number, a: number, b: number): void {
  if (a === b) return;
  for (const part of [re, im]) {
    const kept = part.slice(a * length, (a + 1) * length);
    part.copyWithin(a * length, b * length, (b + 1) * length);
    part.set(kept, b * length);
  }
}

/** Overwrites entries `row`.. of a vector by the unit vector v of the reflector I - 2 v vᴴ that turns it onto axis `row`. */
function makeReflector(re: Float64Array, im: Float64Array, at: number, row: number, length: number, size: number): void {
  const head = at + row;
  const headSize = Math.sqrt(re[head] * re[head] + im[head] * im[head]);
  if (headSize === 0) re[head] = size;
  else {
    re[head] += (re[head] / headSize) * size;
    im[head] += (im[head] / headSize) * size;
  }
  const norm = Math.sqrt(2 * size * (size + headSize));
  for (let i = head; i < at + length; i++) {
    re[i] /= norm;
    im[i] /= norm;
  }
}

function reflect(
  vRe: Float64Array,
  vIm: Float64Array,
  v: number,
  xRe: Float64Array,
  xIm: Float64Array,
  x: number,
  row: number,
  length: number,
): void {
  let dotRe = 0;
  let dotIm = 0;
  for (let i = row; i < length; i++) {
    dotRe += vRe[v + i] * xRe[x + i] + vIm[v + i] * xIm[x + i];
    dotIm += vRe[v + i] * xIm[x + i] - vIm[v + i] * xRe[x + i];
  }
  for (let i = row; i < length; i++) {
    xRe[x + i] -= 2 * (vRe[v + i] * dotRe - vIm[v + i] * dotIm);
    xIm[x + i] -= 2 * (vRe[v + i] * dotIm + vIm[v + i] * dotRe);
  }
}
