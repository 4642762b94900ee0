import { Matrix } from "ml-matrix";
import type { Complex } from "../plant/model";
import { type Balanced, balance } from "./balance";
import type { ComplexMatrix } from "./complex";
import { sortedOrder, unshift } from "./eigenvalues";
import { largestEntry, toFlat } from "./flat";
import { type FlatSchur, flatSchur } from "./real-schur";
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
  const form = ordered(A);
  return { values: valuesOf(form), right: rightColumns(form), left: leftColumns(form) };
}

/** The same without the left eigenvectors. */
export function rightEigensystem(A: Matrix): Omit<Eigensystem, "left"> {
  const form = ordered(A);
  return { values: valuesOf(form), right: rightColumns(form) };
}

type Form = FlatSchur & {
  readonly n: number;
  readonly balanced: Balanced;
  readonly values: readonly Complex[];
  /** Places of the values in the order of this module. */
  readonly order: readonly number[];
};

function ordered(A: Matrix): Form {
  requireSquare("A", A);
  requireFinite("A", A);
  const n = A.rows;
  const balanced = balance(toFlat(A), n);
  const schur = flatSchur(balanced.matrix, n);
  const values = schurValues(schur.t, n);
  return { ...schur, n, balanced, values, order: sortedOrder(values) };
}

function valuesOf({ values, order, balanced }: Form): Complex[] {
  return order.map((k) => unshift(values[k], balanced.shift));
}

function rightColumns({ t, qt, n, balanced, order }: Form): ComplexMatrix {
  const { re, im } = triangularVectors(t, n);
  const columns = emptyColumns(n);
  const [x, y] = [workArray(n), workArray(n)];
  order.forEach((k, column) => {
    backTransform(re[k], qt, n, x);
    backTransform(im[k], qt, n, y);
    putColumn(columns, column, x, y, balanced, false);
  });
  return columns;
}

function leftColumns({ t, qt, n, balanced, values, order }: Form): ComplexMatrix {
  const flipped = triangularVectors(flipTranspose(t, n), n);
  const columns = emptyColumns(n);
  const [re, im, x, y] = [workArray(n), workArray(n), workArray(n), workArray(n)];
  order.forEach((k, column) => {
    // In the flipped matrix a pair stands in reverse, and the left vector is the conjugate of the vector of the transpose.
    const place = values[k].im === 0 ? n - 1 - k : values[k].im > 0 ? n - 2 - k : n - k;
    for (let i = 0; i < n; i++) {
      re[i] = flipped.re[place][n - 1 - i];
      im[i] = 0 - flipped.im[place][n - 1 - i];
    }
    backTransform(re, qt, n, x);
    backTransform(im, qt, n, y);
    putColumn(columns, column, x, y, balanced, true);
  });
  return columns;
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

/** Q x into y, with the columns of Q in the rows of qt. */
function backTransform(x: Float64Array, qt: Float64Array, n: number, y: Float64Array): void {
  y.fill(0);
  for (let k = 0; k < n; k++) {
    const entry = x[k];
    if (entry === 0) continue;
    for (let i = 0, at = k * n; i < n; i++, at++) y[i] += entry * qt[at];
  }
}

/** Undoes order and scale (inverse scale for left vectors) and makes the column one unit long; overwrites x and y. */
function putColumn(
  to: ComplexMatrix,
  column: number,
  x: Float64Array,
  y: Float64Array,
  { order, scale }: Balanced,
  left: boolean,
): void {
  const size = Math.max(largestEntry(x), largestEntry(y));
  for (let i = 0; i < x.length; i++) {
    x[i] = left ? x[i] / size / scale[i] : (x[i] / size) * scale[i];
    y[i] = left ? y[i] / size / scale[i] : (y[i] / size) * scale[i];
  }
  const largest = Math.max(largestEntry(x), largestEntry(y));
  let sum = 0;
  for (let i = 0; i < x.length; i++) sum += (x[i] / largest) * (x[i] / largest) + (y[i] / largest) * (y[i] / largest);
  const length = Math.sqrt(sum);
  for (let i = 0; i < x.length; i++) {
    to.re.set(order[i], column, x[i] / largest / length);
    to.im.set(order[i], column, y[i] / largest / length);
  }
}
