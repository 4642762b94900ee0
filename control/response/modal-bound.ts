import type { ComplexMatrix } from "../linalg/complex";
import { eigensystem } from "../linalg/eigensystem";
import { fromFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { workArray, workCopy } from "../linalg/work-array";

/** A free motion as the sum of its modes: |signal i's departure| ≤ Σ sizes[i · order + k] e^(-rates[k] t) for t ≥ 0. */
export type ModalBound = { readonly rates: Float64Array; readonly sizesOf: (state: Float64Array) => Float64Array };

/** Least cosine between left and right vectors, and least rate in parts of the norm, for which rounding cannot matter. */
const LEAST_COSINE = 1e-5;
const LEAST_RATE = 1e-11;
/** Room for rounding: for that of sums, and for what rates and vectors that are exact for a matrix n ε away can be off by. */
const SPARE = 1e-7;
const ROUNDING = 4 * Number.EPSILON;

/**
 * Bound on a free motion by the sizes of its modes. Where one slow pair is left it is as tight as an envelope can be, which the
 * bound by a quadratic form is not.
 *
 * Shapes    a n×n, rows of signals (signals×n)
 * Throws    no-convergence
 * Accuracy  from above; null where eigenvectors are nearly parallel or a mode fades too slowly for its rate to be known
 */
export function modalBound(a: Float64Array, n: number, rows: Float64Array): ModalBound | null {
  const { values, right, left } = eigensystem(fromFlat(a, n, n));
  const rates = Float64Array.from(values, ({ re }) => -re);
  const slowest = rates.reduce((least, rate) => Math.min(least, rate), Number.POSITIVE_INFINITY) / flatNorm(a);
  const cosines = Float64Array.from(rates, (_, k) => cosineBetween(left, right, k));
  const least = cosines.reduce((smallest, cosine) => Math.min(smallest, cosine), 1);
  if (!(slowest > LEAST_RATE && least > LEAST_COSINE)) return null;
  const spare = 1 + SPARE + (ROUNDING * n) / (slowest * least);
  const signals = rows.length / n;
  const weights = workArray(rows.length);
  for (let i = 0; i < signals; i++) {
    const row = rows.subarray(i * n, (i + 1) * n);
    for (let k = 0; k < n; k++) {
      const [x, y] = project(row, right, k);
      weights[i * n + k] = (Math.sqrt(x * x + y * y) / cosines[k]) * spare;
    }
  }
  const sizesOf = (state: Float64Array) => {
    const sizes = workCopy(weights);
    for (let k = 0; k < n; k++) {
      const [x, y] = project(state, left, k);
      const amplitude = Math.sqrt(x * x + y * y);
      for (let i = 0; i < signals; i++) sizes[i * n + k] *= amplitude;
    }
    return sizes;
  };
  return { rates, sizesOf };
}

/** |w* v| of the left and the right vector of mode k, both of length one. */
function cosineBetween(left: ComplexMatrix, right: ComplexMatrix, k: number): number {
  let [re, im] = [0, 0];
  for (let j = 0; j < right.re.rows; j++) {
    re += left.re.get(j, k) * right.re.get(j, k) + left.im.get(j, k) * right.im.get(j, k);
    im += left.re.get(j, k) * right.im.get(j, k) - left.im.get(j, k) * right.re.get(j, k);
  }
  return Math.sqrt(re * re + im * im);
}

/** A real row times column k. */
function project(row: Float64Array, { re, im }: ComplexMatrix, k: number): readonly [number, number] {
  let [x, y] = [0, 0];
  for (let j = 0; j < row.length; j++) {
    x += row[j] * re.get(j, k);
    y += row[j] * im.get(j, k);
  }
  return [x, y];
}
