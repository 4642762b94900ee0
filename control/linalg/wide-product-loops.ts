import type { Split, Wide } from "./double-double";
import { workArray } from "./work-array";

/** 2^27 + 1: splits a double into two halves of at most 26 bits (Veltkamp). */
export const SPLITTER = 134217729;

/** For two columns of the right matrix and each inner index: two values, their heads, their tails and what lies below. */
let panel = new Float64Array(256);

/**
 * The loops behind `wideProduct`, one row and two columns at a time, and the reference for the accelerator: every entry starts
 * from +0 and adds its products in order of the inner index.
 */
export function wideProductByLoops(a: Split, b: Wide, rows: number, inner: number, columns: number): Wide {
  // Read once: the halves may be made on being asked for.
  const { value, head, tail } = a;
  const left = { value, head, tail };
  const product = { hi: workArray(rows * columns), lo: workArray(rows * columns) };
  if (panel.length < 8 * inner) panel = new Float64Array(8 * inner);
  for (let j = 0; j < columns; j += 2) {
    const both = j + 1 < columns;
    for (let k = 0, at = 0, from = j; k < inner; k++, at += 8, from += columns) {
      packOne(b, from, at);
      if (both) packOne(b, from + 1, at + 1);
    }
    for (let i = 0; i < rows; i++) {
      const out = i * columns + j;
      if (both) twoColumns(left, i * inner, inner, product, out);
      else oneColumn(left, i * inner, inner, product, out);
    }
  }
  return product;
}

function packOne({ hi, lo }: Wide, from: number, at: number): void {
  const value = hi[from];
  const large = SPLITTER * value;
  const head = large - (large - value);
  panel[at] = value;
  panel[at + 2] = head;
  panel[at + 4] = value - head;
  panel[at + 6] = lo[from];
}

function twoColumns({ value, head, tail }: Split, at: number, inner: number, product: Wide, out: number): void {
  const p = panel;
  let [sum, rest, otherSum, otherRest] = [0, 0, 0, 0];
  for (let k = at, q = 0; k < at + inner; k++, q += 8) {
    const x = value[k];
    const h = head[k];
    const t = tail[k];
    const term = x * p[q];
    const below = t * p[q + 4] - (term - h * p[q + 2] - t * p[q + 2] - h * p[q + 4]);
    const total = sum + term;
    const part = total - sum;
    rest += sum - (total - part) + (term - part) + (below + x * p[q + 6]);
    sum = total;
    const otherTerm = x * p[q + 1];
    const otherBelow = t * p[q + 5] - (otherTerm - h * p[q + 3] - t * p[q + 3] - h * p[q + 5]);
    const otherTotal = otherSum + otherTerm;
    const otherPart = otherTotal - otherSum;
    otherRest += otherSum - (otherTotal - otherPart) + (otherTerm - otherPart) + (otherBelow + x * p[q + 7]);
    otherSum = otherTotal;
  }
  store(product, out, sum, rest);
  store(product, out + 1, otherSum, otherRest);
}

function oneColumn({ value, head, tail }: Split, at: number, inner: number, product: Wide, out: number): void {
  const p = panel;
  let sum = 0;
  let rest = 0;
  for (let k = at, q = 0; k < at + inner; k++, q += 8) {
    const x = value[k];
    const h = head[k];
    const t = tail[k];
    const term = x * p[q];
    const below = t * p[q + 4] - (term - h * p[q + 2] - t * p[q + 2] - h * p[q + 4]);
    const total = sum + term;
    const part = total - sum;
    rest += sum - (total - part) + (term - part) + (below + x * p[q + 6]);
    sum = total;
  }
  store(product, out, sum, rest);
}

/** Renormalised: |lo| ≤ ulp(hi) / 2. */
function store({ hi, lo }: Wide, at: number, sum: number, rest: number): void {
  const total = sum + rest;
  hi[at] = total;
  lo[at] = rest - (total - sum);
}
