import { Matrix } from "ml-matrix";

/** Row-major entries of M in one array: what every inner loop of this folder works on. */
export function toFlat(M: Matrix): Float64Array {
  const flat = new Float64Array(M.rows * M.columns);
  for (let i = 0; i < M.rows; i++) for (let j = 0; j < M.columns; j++) flat[i * M.columns + j] = M.get(i, j);
  return flat;
}

export function fromFlat(flat: ArrayLike<number>, rows: number, columns: number): Matrix {
  const M = new Matrix(rows, columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) M.set(i, j, flat[i * columns + j]);
  return M;
}

export function flatIdentity(n: number): Float64Array {
  const identity = new Float64Array(n * n);
  for (let i = 0; i < n; i++) identity[i * n + i] = 1;
  return identity;
}

export function flatTranspose(a: Float64Array, rows: number, columns: number): Float64Array {
  const t = new Float64Array(a.length);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) t[j * rows + i] = a[i * columns + j];
  return t;
}

/** a (rows×inner) times b (inner×columns); sums run in order of the inner index. */
export function flatProduct(a: Float64Array, b: Float64Array, rows: number, inner: number, columns: number): Float64Array {
  const product = new Float64Array(rows * columns);
  for (let i = 0; i < rows; i++) {
    const out = i * columns;
    for (let k = 0; k < inner; k++) {
      const factor = a[i * inner + k];
      if (factor === 0) continue;
      const from = k * columns;
      for (let j = 0; j < columns; j++) product[out + j] += factor * b[from + j];
    }
  }
  return product;
}

/** a' (columnsA×rows) times b (rows×columnsB), both stored untransposed. */
export function flatTransposedProduct(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  columnsA: number,
  columnsB: number,
): Float64Array {
  const product = new Float64Array(columnsA * columnsB);
  for (let k = 0; k < rows; k++) {
    for (let i = 0; i < columnsA; i++) {
      const factor = a[k * columnsA + i];
      if (factor === 0) continue;
      for (let j = 0; j < columnsB; j++) product[i * columnsB + j] += factor * b[k * columnsB + j];
    }
  }
  return product;
}

/** Largest size of an entry; NaN when any is NaN, so that no norm can hide one. */
export function largestEntry(a: ArrayLike<number>): number {
  let largest = 0;
  for (let i = 0; i < a.length; i++) {
    const size = Math.abs(a[i]);
    if (Number.isNaN(size)) return size;
    if (size > largest) largest = size;
  }
  return largest;
}

/** Square root of the sum of squares of two numbers without overflow; only division and square root. */
export function pythagoras(x: number, y: number): number {
  const a = Math.abs(x);
  const b = Math.abs(y);
  const large = Math.max(a, b);
  const small = Math.min(a, b);
  if (large === 0) return 0;
  const ratio = small / large;
  return large * Math.sqrt(1 + ratio * ratio);
}
