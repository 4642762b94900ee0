import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import type { ComplexMatrix, ComplexVector } from "./complex";
import { largestEntry } from "./flat";
import { orthogonaliseRows, type Rows } from "./orthogonalise-rows";
import { requireFinite, requireShape } from "./require";
import { requireRepresentable } from "./require-representable";
import { workArray } from "./work-array";

/**
 * Singular values, largest first.
 *
 * Shapes    M r×c → min(r, c) values
 * Units     those of M
 * Throws    not-finite; no-convergence; too-large when a value is beyond the largest double
 * Accuracy  c ε of the largest; better where rows (of a wide M) or columns (of a tall one) differ in size
 * Source    Demmel & Veselic, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245
 */
export function singularValues(M: Matrix): number[] {
  requireFinite("M", M);
  const wide = M.rows <= M.columns ? M : M.transpose();
  const { values } = orthogonaliseRows({ re: rowsOf(wide), im: null });
  requireRepresentable("singular value", values);
  return values;
}

/** M right = value left and left* M = value right*, both vectors of unit length. */
export type SingularTriple = { readonly value: number; readonly right: ComplexVector; readonly left: ComplexVector };

/**
 * Smallest of the min(r, c) singular values of a complex matrix, with its vectors.
 *
 * Shapes    re, im r×c → right c, left r
 * Units     value as the matrix
 * Throws    shape-mismatch; not-finite; no-convergence
 * Accuracy  value to c ε of the largest singular value; a zero value gets vectors from the null spaces
 * Source    Demmel & Veselic, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245
 */
export function smallestSingularComplex(re: Matrix, im: Matrix): SingularTriple {
  requireShape("im", im, re.rows, re.columns);
  requireFinite("re", re);
  requireFinite("im", im);
  if (re.rows > re.columns) {
    // The conjugate transpose is wide and has the two vectors exchanged.
    const turned = smallestOfWide({ re: re.transpose(), im: im.transpose().mul(-1) });
    return { value: turned.value, right: turned.left, left: turned.right };
  }
  return smallestOfWide({ re, im });
}

function smallestOfWide(M: ComplexMatrix): SingularTriple {
  const real = M.im.to1DArray().every((entry) => entry === 0);
  const { values, rows, turn } = orthogonaliseRows({ re: rowsOf(M.re), im: real ? null : rowsOf(M.im) });
  const last = values.length - 1;
  requireRepresentable("singular value", values.slice(last));
  if (last < 0) throw new NumericalError("shape-mismatch", { matrix: "re", given: [M.re.rows, M.re.columns] });
  const left = conjugate(rowOf(turn, last));
  const row = rowOf(rows, last);
  const size = Math.max(largestEntry(row.re), largestEntry(row.im));
  const negligible = size <= Number.EPSILON * Math.max(largestEntry(rows.re[0]), rows.im ? largestEntry(rows.im[0]) : 0);
  return { value: values[last], left, right: conjugate(negligible ? outsideRows(rows, last) : unit(row)) };
}

function rowsOf(M: Matrix): Float64Array[] {
  return Array.from({ length: M.rows }, (_, i) => Float64Array.from(M.getRow(i)));
}

function rowOf({ re, im }: Rows, i: number): ComplexVector {
  return { re: re[i], im: im ? im[i] : workArray(re[i].length) };
}

function conjugate({ re, im }: ComplexVector): ComplexVector {
  return { re, im: im.map((x) => 0 - x) };
}

function unit({ re, im }: ComplexVector): ComplexVector {
  const largest = Math.max(largestEntry(re), largestEntry(im));
  let sum = 0;
  for (let k = 0; k < re.length; k++) sum += (re[k] / largest) * (re[k] / largest) + (im[k] / largest) * (im[k] / largest);
  const length = Math.sqrt(sum);
  return { re: re.map((x) => x / largest / length), im: im.map((x) => x / largest / length) };
}

/** Unit vector orthogonal to all earlier rows that are not zero: the coordinate vector that keeps most, made orthogonal twice. */
function outsideRows(rows: Rows, count: number): ComplexVector {
  const basis = Array.from({ length: count }, (_, i) => rowOf(rows, i))
    .filter(({ re, im }) => Math.max(largestEntry(re), largestEntry(im)) > 0)
    .map(unit);
  const length = rows.re[0].length;
  const kept = Array.from({ length }, (_, k) => basis.reduce((rest, { re, im }) => rest - re[k] * re[k] - im[k] * im[k], 1));
  const start = { re: workArray(length), im: workArray(length) };
  start.re[kept.indexOf(Math.max(...kept))] = 1;
  for (let round = 0; round < 2; round++) for (const row of basis) removePart(start, row);
  return unit(start);
}

function removePart(x: ComplexVector, row: ComplexVector): void {
  let re = 0;
  let im = 0;
  for (let k = 0; k < x.re.length; k++) {
    re += row.re[k] * x.re[k] + row.im[k] * x.im[k];
    im += row.re[k] * x.im[k] - row.im[k] * x.re[k];
  }
  for (let k = 0; k < x.re.length; k++) {
    x.re[k] -= re * row.re[k] - im * row.im[k];
    x.im[k] -= re * row.im[k] + im * row.re[k];
  }
}
