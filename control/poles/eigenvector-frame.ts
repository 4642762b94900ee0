import { Matrix } from "ml-matrix";
import { workArray } from "../linalg/work-array";

/**
 * Closed-loop eigenvectors under construction, in real form: a real pole owns one unit column, a pair owns √2 Re x and √2 Im x
 * of its unit eigenvector x, which has the same norms and condition as x and its conjugate side by side.
 */
export type Frame = {
  readonly n: number;
  /** Column j at j n. */
  readonly columns: Float64Array;
  /** Row i of the inverse at i n. */
  readonly duals: Float64Array;
  /** Squared length of each dual row. */
  readonly norms: Float64Array;
  /** Row exchanges of the last inversion. */
  readonly places: Int32Array;
};

export function createFrame(n: number): Frame {
  const places = new Int32Array(n);
  return { n, columns: workArray(n * n), duals: workArray(n * n), norms: workArray(n), places };
}

export function copyInto(from: Frame, to: Frame): void {
  to.columns.set(from.columns);
  to.duals.set(from.duals);
  to.norms.set(from.norms);
}

/** |X⁻¹| squared, Frobenius: what conditioning is judged by while it is improved. */
export function frameCost({ norms }: Frame): number {
  let sum = 0;
  for (let i = 0; i < norms.length; i++) sum += norms[i];
  return sum;
}

export function columnsAsMatrix({ n, columns }: Frame): Matrix {
  const X = new Matrix(n, n);
  for (let j = 0; j < n; j++) for (let i = 0; i < n; i++) X.set(i, j, columns[j * n + i]);
  return X;
}

/**
 * Recomputes the inverse from the columns, which removes the rounding of many updates; false when they are dependent.
 * Gauss-Jordan elimination of the transposed inverse in place, with row exchanges.
 */
export function refreshDuals(frame: Frame): boolean {
  const { n, columns, duals, places } = frame;
  // Row j of this work is column j of X; its inverse then holds the dual rows as columns.
  const work = duals;
  for (let k = 0; k < n * n; k++) work[k] = columns[k];
  for (let p = 0; p < n; p++) {
    const row = largestBelow(work, n, p);
    places[p] = row;
    const pivot = work[row * n + p];
    if (pivot === 0 || !Number.isFinite(1 / pivot)) return false;
    if (row !== p) exchangeRows(work, n, p, row);
    work[p * n + p] = 1;
    for (let j = 0; j < n; j++) work[p * n + j] /= pivot;
    for (let i = 0; i < n; i++) {
      if (i === p) continue;
      const factor = work[i * n + p];
      if (factor === 0) continue;
      work[i * n + p] = 0;
      subtractMultiple(work, i * n, work, p * n, factor, n);
    }
  }
  for (let p = n - 1; p >= 0; p--) if (places[p] !== p) exchangeColumns(work, n, p, places[p]);
  transposeInPlace(work, n);
  measureDuals(frame);
  return Number.isFinite(frameCost(frame));
}

function largestBelow(a: Float64Array, n: number, p: number): number {
  let row = p;
  for (let i = p + 1; i < n; i++) if (Math.abs(a[i * n + p]) > Math.abs(a[row * n + p])) row = i;
  return row;
}

function exchangeRows(a: Float64Array, n: number, p: number, q: number): void {
  for (let j = 0; j < n; j++) {
    const kept = a[p * n + j];
    a[p * n + j] = a[q * n + j];
    a[q * n + j] = kept;
  }
}

function exchangeColumns(a: Float64Array, n: number, p: number, q: number): void {
  for (let i = 0; i < n; i++) {
    const kept = a[i * n + p];
    a[i * n + p] = a[i * n + q];
    a[i * n + q] = kept;
  }
}

function transposeInPlace(a: Float64Array, n: number): void {
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < i; j++) {
      const kept = a[i * n + j];
      a[i * n + j] = a[j * n + i];
      a[j * n + i] = kept;
    }
  }
}

export function dotRow(rows: Float64Array, at: number, x: Float64Array, from: number, n: number): number {
  let sum = 0;
  for (let k = 0; k < n; k++) sum += rows[at + k] * x[from + k];
  return sum;
}

/** Puts x in column j; false, and nothing changed, when that would make the columns dependent. */
export function replaceColumn(frame: Frame, j: number, x: Float64Array): boolean {
  const { n, columns, duals, norms } = frame;
  const row = j * n;
  const pivot = dotRow(duals, row, x, 0, n);
  if (!(Math.abs(pivot) > 0) || !Number.isFinite(1 / pivot)) return false;
  for (let k = 0; k < n; k++) columns[row + k] = x[k];
  for (let k = 0; k < n; k++) duals[row + k] /= pivot;
  for (let i = 0; i < n; i++) {
    if (i !== j) subtractMultiple(duals, i * n, duals, row, dotRow(duals, i * n, x, 0, n), n);
    norms[i] = dotRow(duals, i * n, duals, i * n, n);
  }
  return true;
}

/** Puts u and v in columns j and j + 1; false, and nothing changed, when that would make the columns dependent. */
export function replacePair(frame: Frame, j: number, u: Float64Array, v: Float64Array): boolean {
  const { n, columns, duals } = frame;
  const first = j * n;
  const second = first + n;
  const h11 = dotRow(duals, first, u, 0, n);
  const h12 = dotRow(duals, first, v, 0, n);
  const h21 = dotRow(duals, second, u, 0, n);
  const h22 = dotRow(duals, second, v, 0, n);
  const determinant = h11 * h22 - h12 * h21;
  if (!(Math.abs(determinant) > 0) || !Number.isFinite(1 / determinant)) return false;
  for (let k = 0; k < n; k++) {
    columns[first + k] = u[k];
    columns[second + k] = v[k];
    const p = duals[first + k];
    const q = duals[second + k];
    duals[first + k] = (h22 * p - h12 * q) / determinant;
    duals[second + k] = (h11 * q - h21 * p) / determinant;
  }
  for (let i = 0; i < n; i++) {
    if (i === j || i === j + 1) continue;
    let alongU = 0;
    let alongV = 0;
    for (let k = 0, at = i * n; k < n; k++, at++) {
      alongU += duals[at] * u[k];
      alongV += duals[at] * v[k];
    }
    for (let k = 0, at = i * n; k < n; k++, at++) duals[at] -= alongU * duals[first + k] + alongV * duals[second + k];
  }
  measureDuals(frame);
  return true;
}

function subtractMultiple(y: Float64Array, at: number, x: Float64Array, from: number, factor: number, n: number): void {
  for (let k = 0; k < n; k++) y[at + k] -= factor * x[from + k];
}

/** Rows by twos, whose sums do not wait for each other. */
function measureDuals({ n, duals, norms }: Frame): void {
  let i = 0;
  for (; i + 1 < n; i += 2) {
    let first = 0;
    let second = 0;
    for (let at = i * n, end = at + n; at < end; at++) {
      first += duals[at] * duals[at];
      second += duals[at + n] * duals[at + n];
    }
    norms[i] = first;
    norms[i + 1] = second;
  }
  if (i < n) norms[i] = dotRow(duals, i * n, duals, i * n, n);
}
