import type { Matrix } from "ml-matrix";
import { largestEntry } from "./flat";
import { exponentOf, powerOfTwo } from "./power-of-two";
import { singularValues } from "./singular-values";

/** Largest column sum of absolute values. */
export function oneNorm(M: Matrix): number {
  let norm = 0;
  for (let j = 0; j < M.columns; j++) {
    let sum = 0;
    for (let i = 0; i < M.rows; i++) sum += Math.abs(M.get(i, j));
    norm = Math.max(norm, sum);
  }
  return norm;
}

/** Largest row sum of absolute values. */
export function infinityNorm(M: Matrix): number {
  let norm = 0;
  for (let i = 0; i < M.rows; i++) {
    let sum = 0;
    for (let j = 0; j < M.columns; j++) sum += Math.abs(M.get(i, j));
    norm = Math.max(norm, sum);
  }
  return norm;
}

/** Square root of the sum of squares, without overflow in between. */
export function frobeniusNorm(M: Matrix): number {
  return flatNorm(M.to1DArray());
}

/** Largest singular value. */
export function twoNorm(M: Matrix): number {
  return singularValues(M)[0] ?? 0;
}

/** Euclidean length of any array of numbers, without overflow in between. */
export function flatNorm(a: ArrayLike<number>): number {
  const largest = largestEntry(a);
  if (largest === 0) return 0;
  // A power of two, so that scaling rounds nothing and powers of two in the units come out of every norm exactly.
  const exponent = Math.max(-1022, Math.min(exponentOf(largest), 1022));
  const factor = powerOfTwo(-exponent);
  let sum = 0;
  for (let i = 0; i < a.length; i++) {
    const x = a[i] * factor;
    sum += x * x;
  }
  return Math.sqrt(sum) * powerOfTwo(exponent);
}
