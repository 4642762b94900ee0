import { Matrix } from "ml-matrix";
import { flatIdentity, flatTranspose } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";

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
};

export function createFrame(n: number): Frame {
  return { n, columns: new Float64Array(n * n), duals: new Float64Array(n * n), norms: new Float64Array(n) };
}

export function copyFrame({ n, columns, duals, norms }: Frame): Frame {
  return { n, columns: columns.slice(), duals: duals.slice(), norms: norms.slice() };
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

/** Recomputes the inverse from the columns, which removes the rounding of many updates; false when they are dependent. */
export function refreshDuals(frame: Frame): boolean {
  const { n, columns, duals } = frame;
  const factors = factorLu(flatTranspose(columns, n, n), n);
  if (factors.zeroPivot >= 0) return false;
  duals.set(solveLu(factors, flatIdentity(n), n));
  measureDuals(frame);
  return Number.isFinite(frameCost(frame));
}

export function dotRow(rows: Float64Array, at: number, x: Float64Array, from: number, n: number): number {
  let sum = 0;
  for (let k = 0; k < n; k++) sum += rows[at + k] * x[from + k];
  return sum;
}

/** Puts x in column j; false, and nothing changed, when that would make the columns dependent. */
export function replaceColumn(frame: Frame, j: number, x: Float64Array): boolean {
  const { n, columns, duals } = frame;
  const pivot = dotRow(duals, j * n, x, 0, n);
  if (!(Math.abs(pivot) > 0) || !Number.isFinite(1 / pivot)) return false;
  columns.set(x, j * n);
  for (let k = 0; k < n; k++) duals[j * n + k] /= pivot;
  for (let i = 0; i < n; i++) if (i !== j) subtractMultiple(duals, i * n, duals, j * n, dotRow(duals, i * n, x, 0, n), n);
  measureDuals(frame);
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
  columns.set(u, first);
  columns.set(v, second);
  for (let k = 0; k < n; k++) {
    const p = duals[first + k];
    const q = duals[second + k];
    duals[first + k] = (h22 * p - h12 * q) / determinant;
    duals[second + k] = (h11 * q - h21 * p) / determinant;
  }
  for (let i = 0; i < n; i++) {
    if (i === j || i === j + 1) continue;
    const alongU = dotRow(duals, i * n, u, 0, n);
    const alongV = dotRow(duals, i * n, v, 0, n);
    subtractMultiple(duals, i * n, duals, first, alongU, n);
    subtractMultiple(duals, i * n, duals, second, alongV, n);
  }
  measureDuals(frame);
  return true;
}

function subtractMultiple(y: Float64Array, at: number, x: Float64Array, from: number, factor: number, n: number): void {
  for (let k = 0; k < n; k++) y[at + k] -= factor * x[from + k];
}

function measureDuals({ n, duals, norms }: Frame): void {
  for (let i = 0; i < n; i++) norms[i] = dotRow(duals, i * n, duals, i * n, n);
}
