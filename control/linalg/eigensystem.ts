import { Matrix } from "ml-matrix";
import type { Complex } from "../plant/model";
import { type Balanced, balance } from "./balance";
import type { ComplexMatrix } from "./complex";
import { sortedOrder, unshift } from "./eigenvalues";
import { largestEntry, toFlat } from "./flat";
import { flatSchur } from "./real-schur";
import { requireFinite, requireSquare } from "./require";
import { schurValues } from "./schur-values";
import { triangularVectors } from "./triangular-vectors";
import { workArray } from "./work-array";

/** A v = value v with v column k of `right`; w* A = value w* with w column k of `left`; unit columns, same order as `values`. */
export type Eigensystem = { readonly values: Complex[]; readonly right: ComplexMatrix; readonly left: ComplexMatrix };

/**
 * Eigenvalues with right and left eigenvectors. Of a defective eigenvalue the vectors come out nearly parallel, never NaN.
 *
 * Shapes    A n×n → n values, right n×n, left n×n (real and imaginary parts); order as in `eigenvalues`
 * Units     values as A; columns have 2-norm one
 * Throws    shape-mismatch; not-finite; no-convergence; too-large
 * Accuracy  exact for A + E, |E| ≤ c n ε |D⁻¹AD|, one E per vector
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, sections 7.5 and 7.6
 */
export function eigensystem(A: Matrix): Eigensystem {
  requireSquare("A", A);
  requireFinite("A", A);
  const n = A.rows;
  const balanced = balance(toFlat(A), n);
  const { t, qt } = flatSchur(balanced.matrix, n);
  const values = schurValues(t, n);
  const flipped = flipTranspose(t, n);
  const rightOfT = triangularVectors(t, n);
  const leftOfT = triangularVectors(flipped, n);
  const right = emptyColumns(n);
  const left = emptyColumns(n);
  const order = sortedOrder(values);
  order.forEach((k, column) => {
    putColumn(right, column, backTransform(rightOfT.re[k], qt, n), backTransform(rightOfT.im[k], qt, n), balanced, false);
    // In the flipped matrix a pair stands in reverse, and the left vector is the conjugate of the vector of the transpose.
    const place = values[k].im === 0 ? n - 1 - k : values[k].im > 0 ? n - 2 - k : n - k;
    const re = leftOfT.re[place].toReversed();
    const im = leftOfT.im[place].toReversed().map((entry) => 0 - entry);
    putColumn(left, column, backTransform(re, qt, n), backTransform(im, qt, n), balanced, true);
  });
  return { values: order.map((k) => unshift(values[k], balanced.shift)), right, left };
}

function emptyColumns(n: number): ComplexMatrix {
  return { re: Matrix.zeros(n, n), im: Matrix.zeros(n, n) };
}

/** Transposed about the other diagonal: again quasi-triangular with the same blocks, in reverse order. */
function flipTranspose(t: Float64Array, n: number): Float64Array {
  const flipped = workArray(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) flipped[i * n + j] = t[(n - 1 - j) * n + n - 1 - i];
  return flipped;
}

/** Q x, with the columns of Q in the rows of qt. */
function backTransform(x: Float64Array, qt: Float64Array, n: number): Float64Array {
  const y = workArray(n);
  for (let k = 0; k < n; k++) {
    if (x[k] === 0) continue;
    for (let i = 0; i < n; i++) y[i] += x[k] * qt[k * n + i];
  }
  return y;
}

/** Undoes order and scale (inverse scale for left vectors) and makes the column one unit long. */
function putColumn(
  to: ComplexMatrix,
  column: number,
  re: Float64Array,
  im: Float64Array,
  { order, scale }: Balanced,
  left: boolean,
): void {
  const size = Math.max(largestEntry(re), largestEntry(im));
  const x = re.map((entry, i) => (left ? entry / size / scale[i] : (entry / size) * scale[i]));
  const y = im.map((entry, i) => (left ? entry / size / scale[i] : (entry / size) * scale[i]));
  const largest = Math.max(largestEntry(x), largestEntry(y));
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += (x[i] / largest) * (x[i] / largest) + (y[i] / largest) * (y[i] / largest);
  const length = Math.sqrt(sum);
  for (let i = 0; i < x.length; i++) {
    to.re.set(order[i], column, x[i] / largest / length);
    to.im.set(order[i], column, y[i] / largest / length);
  }
}
