import { Matrix } from "ml-matrix";
import { acceleratedProduct } from "../accelerator/accelerated-product";
import { productByLoops } from "./product-loops";
import { workArray } from "./work-array";

/** Row-major entries of M in one array: what every inner loop of this folder works on. */
export function toFlat(M: Matrix): Float64Array {
  const flat = workArray(M.rows * M.columns);
  for (let i = 0; i < M.rows; i++) for (let j = 0; j < M.columns; j++) flat[i * M.columns + j] = M.get(i, j);
  return flat;
}

export function fromFlat(flat: ArrayLike<number>, rows: number, columns: number): Matrix {
  const M = new Matrix(rows, columns);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) M.set(i, j, flat[i * columns + j]);
  return M;
}

export function flatIdentity(n: number): Float64Array {
  const identity = workArray(n * n);
  for (let i = 0; i < n; i++) identity[i * n + i] = 1;
  return identity;
}

export function flatTranspose(a: Float64Array, rows: number, columns: number): Float64Array {
  const t = workArray(a.length);
  for (let i = 0; i < rows; i++) for (let j = 0; j < columns; j++) t[j * rows + i] = a[i * columns + j];
  return t;
}

/** a (rows×inner) times b (inner×columns); sums run in order of the inner index. */
export function flatProduct(a: Float64Array, b: Float64Array, rows: number, inner: number, columns: number): Float64Array {
  return acceleratedProduct(a, b, rows, inner, columns) ?? productByLoops(a, b, rows, inner, columns);
}

/** The same into an array that is used again and again; its old entries are overwritten. */
export function flatProductInto(
  product: Float64Array,
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
): void {
  if (!acceleratedProduct(a, b, rows, inner, columns, product)) productByLoops(a, b, rows, inner, columns, product);
}

/** a' (columnsA×rows) times b (rows×columnsB), both stored untransposed. */
export function flatTransposedProduct(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  columnsA: number,
  columnsB: number,
): Float64Array {
  return flatProduct(flatTranspose(a, rows, columnsA), b, columnsA, rows, columnsB);
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
