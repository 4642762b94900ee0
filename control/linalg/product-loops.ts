import { workArray } from "./work-array";

/** Four columns of the right matrix side by side; grows to the longest inner size seen. */
let panel = new Float64Array(256);

/**
 * Product of two matrices by tiles of two rows and four columns over a packed panel. The reference for the accelerator: every
 * entry starts from +0 and adds its products in order of the inner index, whatever the tile.
 *
 * Shapes    a rows×inner, b inner×columns → rows×columns, all row-major
 * Accuracy  |error| ≤ γ_inner |a||b| per entry
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 1.5
 */
export function productByLoops(
  a: Float64Array,
  b: Float64Array,
  rows: number,
  inner: number,
  columns: number,
  product: Float64Array = workArray(rows * columns),
): Float64Array {
  if (panel.length < 4 * inner) panel = new Float64Array(4 * inner);
  for (let j = 0; j < columns; j += 4) {
    const width = columns - j;
    if (width === 1) {
      oneColumn(a, b, product, rows, inner, columns, j);
      return product;
    }
    pack(b, inner, columns, j, width);
    for (let i = 0; i < rows; i += 2) tile(a, product, i, rows, inner, columns, j, width);
  }
  return product;
}

function oneColumn(
  a: Float64Array,
  b: Float64Array,
  product: Float64Array,
  rows: number,
  inner: number,
  columns: number,
  j: number,
): void {
  for (let i = 0, at = 0; i < rows; i++) {
    let sum = 0;
    for (let k = 0, from = j; k < inner; k++, from += columns) sum += a[at++] * b[from];
    product[i * columns + j] = sum;
  }
}

function pack(b: Float64Array, inner: number, columns: number, j: number, width: number): void {
  for (let k = 0, to = 0, from = j; k < inner; k++, to += 4, from += columns) {
    panel[to] = b[from];
    panel[to + 1] = b[from + 1];
    panel[to + 2] = width > 2 ? b[from + 2] : 0;
    panel[to + 3] = width > 3 ? b[from + 3] : 0;
  }
}

/** Rows i and i + 1 of four columns; of an odd last row both sums are the same one. */
function tile(
  a: Float64Array,
  product: Float64Array,
  i: number,
  rows: number,
  inner: number,
  columns: number,
  j: number,
  width: number,
): void {
  const p = panel;
  let [s0, s1, s2, s3] = [0, 0, 0, 0];
  let [t0, t1, t2, t3] = [0, 0, 0, 0];
  let first = i * inner;
  let second = i + 1 < rows ? first + inner : first;
  for (let at = 0, end = 4 * inner; at < end; at += 4) {
    const x = a[first++];
    const y = a[second++];
    s0 += x * p[at];
    s1 += x * p[at + 1];
    s2 += x * p[at + 2];
    s3 += x * p[at + 3];
    t0 += y * p[at];
    t1 += y * p[at + 1];
    t2 += y * p[at + 2];
    t3 += y * p[at + 3];
  }
  store(product, i * columns + j, width, s0, s1, s2, s3);
  if (i + 1 < rows) store(product, (i + 1) * columns + j, width, t0, t1, t2, t3);
}

function store(product: Float64Array, at: number, width: number, s0: number, s1: number, s2: number, s3: number): void {
  product[at] = s0;
  product[at + 1] = s1;
  if (width > 2) product[at + 2] = s2;
  if (width > 3) product[at + 3] = s3;
}
