import { NumericalError } from "../errors";
import { largestEntry } from "./flat";
import { standardiseAt } from "./francis";
import { workArray } from "./work-array";

/**
 * Swaps the neighbouring diagonal blocks of sizes p and q that start at k of a real Schur form, in place. A pair that a
 * swap leaves as two real eigenvalues is split by standardising, but counted as one block by the caller.
 *
 * Shapes    t n×n, qt n×n (rows are the basis vectors)
 * Throws    no-convergence when the entries to be zeroed stay above 40 ε of the blocks' size
 * Source    Bai & Demmel, Linear Algebra Appl. 186 (1993) 73-95, algorithm of section 3
 */
export function swapBlocks(t: Float64Array, qt: Float64Array, n: number, k: number, p: number, q: number): void {
  const size = p + q;
  const before = largestInside(t, n, k, size);
  const reflectors = columnsReflectors(sylvesterBasis(t, n, k, p, q), size, q);
  for (const { v, beta } of reflectors) {
    reflectRows(t, n, k, v, beta, k);
    reflectColumns(t, n, k, v, beta, k + size);
    reflectRows(qt, n, k, v, beta, 0);
  }
  let left = 0;
  for (let i = q; i < size; i++) {
    for (let j = 0; j < q; j++) {
      left = Math.max(left, Math.abs(t[(k + i) * n + k + j]));
      t[(k + i) * n + k + j] = 0;
    }
  }
  if (left > 40 * Number.EPSILON * before) throw new NumericalError("no-convergence", { routine: "swap-blocks", limit: 1 });
  const work = { h: t, n, full: true, qt };
  if (q === 2) standardiseAt(work, k);
  if (p === 2) standardiseAt(work, k + q);
}

function largestInside(t: Float64Array, n: number, k: number, size: number): number {
  let largest = 0;
  for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) largest = Math.max(largest, Math.abs(t[(k + i) * n + k + j]));
  return largest;
}

/** Columns [-X; g I] that span the invariant subspace of the second block: T11 X - X T22 = g T12. */
function sylvesterBasis(t: Float64Array, n: number, k: number, p: number, q: number): Float64Array {
  const entry = (i: number, j: number) => t[(k + i) * n + k + j];
  const unknowns = p * q;
  const system = workArray(unknowns * unknowns);
  const right = workArray(unknowns);
  for (let i = 0; i < p; i++) {
    for (let j = 0; j < q; j++) {
      const row = (i * q + j) * unknowns;
      for (let l = 0; l < p; l++) system[row + l * q + j] += entry(i, l);
      for (let l = 0; l < q; l++) system[row + i * q + l] -= entry(p + l, p + j);
      right[i * q + j] = entry(i, p + j);
    }
  }
  const g = solveSmall(system, right, unknowns);
  const basis = workArray((p + q) * q);
  for (let i = 0; i < p; i++) for (let j = 0; j < q; j++) basis[i * q + j] = -right[i * q + j];
  for (let j = 0; j < q; j++) basis[(p + j) * q + j] = g;
  return basis;
}

/** Complete pivoting; a pivot below rounding is raised to it. The solution overwrites b; returns the factor that scaled b down. */
function solveSmall(a: Float64Array, b: Float64Array, n: number): number {
  const floor = Math.max(Number.EPSILON * largestEntry(a), 1e-290);
  const columns = Array.from({ length: n }, (_, j) => j);
  for (let k = 0; k < n; k++) {
    let row = k;
    let column = k;
    for (let i = k; i < n; i++) {
      for (let j = k; j < n; j++) {
        if (Math.abs(a[i * n + j]) > Math.abs(a[row * n + column])) {
          row = i;
          column = j;
        }
      }
    }
    swapRows(a, b, n, k, row);
    swapColumns(a, n, k, column);
    [columns[k], columns[column]] = [columns[column], columns[k]];
    if (Math.abs(a[k * n + k]) < floor) a[k * n + k] = floor;
    for (let i = k + 1; i < n; i++) {
      const factor = a[i * n + k] / a[k * n + k];
      for (let j = k + 1; j < n; j++) a[i * n + j] -= factor * a[k * n + j];
      b[i] -= factor * b[k];
    }
  }
  const size = largestEntry(b);
  const smallest = Math.abs(a[n * n - 1]);
  const scale = size > smallest ? smallest / size : 1;
  const x = workArray(n);
  for (let i = n - 1; i >= 0; i--) {
    let sum = b[i] * scale;
    for (let j = i + 1; j < n; j++) sum -= a[i * n + j] * x[j];
    x[i] = sum / a[i * n + i];
  }
  for (let i = 0; i < n; i++) b[columns[i]] = x[i];
  return scale;
}

function swapRows(a: Float64Array, b: Float64Array, n: number, i: number, j: number): void {
  if (i === j) return;
  for (let c = 0; c < n; c++) [a[i * n + c], a[j * n + c]] = [a[j * n + c], a[i * n + c]];
  [b[i], b[j]] = [b[j], b[i]];
}

function swapColumns(a: Float64Array, n: number, i: number, j: number): void {
  if (i === j) return;
  for (let r = 0; r < n; r++) [a[r * n + i], a[r * n + j]] = [a[r * n + j], a[r * n + i]];
}

type Reflector = { readonly v: Float64Array; readonly beta: number };

/** Householder reflectors that bring the rows×columns basis to triangular form. */
function columnsReflectors(basis: Float64Array, rows: number, columns: number): Reflector[] {
  const reflectors: Reflector[] = [];
  for (let c = 0; c < columns; c++) {
    const v = workArray(rows);
    let scale = 0;
    for (let i = c; i < rows; i++) scale = Math.max(scale, Math.abs(basis[i * columns + c]));
    if (scale === 0) continue;
    let sum = 0;
    for (let i = c; i < rows; i++) {
      v[i] = basis[i * columns + c] / scale;
      sum += v[i] * v[i];
    }
    const length = Math.sqrt(sum);
    const beta = 1 / (length * (length + Math.abs(v[c])));
    v[c] += v[c] >= 0 ? length : -length;
    for (let j = c; j < columns; j++) {
      let product = 0;
      for (let i = c; i < rows; i++) product += v[i] * basis[i * columns + j];
      for (let i = c; i < rows; i++) basis[i * columns + j] -= beta * product * v[i];
    }
    reflectors.push({ v, beta });
  }
  return reflectors;
}

function reflectRows(h: Float64Array, n: number, k: number, v: Float64Array, beta: number, first: number): void {
  for (let j = first; j < n; j++) {
    let sum = 0;
    for (let i = 0; i < v.length; i++) sum += v[i] * h[(k + i) * n + j];
    for (let i = 0; i < v.length; i++) h[(k + i) * n + j] -= beta * sum * v[i];
  }
}

function reflectColumns(h: Float64Array, n: number, k: number, v: Float64Array, beta: number, last: number): void {
  for (let i = 0; i < last; i++) {
    let sum = 0;
    for (let j = 0; j < v.length; j++) sum += h[i * n + k + j] * v[j];
    for (let j = 0; j < v.length; j++) h[i * n + k + j] -= beta * sum * v[j];
  }
}
