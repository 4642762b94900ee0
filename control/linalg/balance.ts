import { largestEntry } from "./flat";
import { exponentOf, powerOfTwo } from "./power-of-two";
import { strongComponents } from "./strong-components";
import { workArray } from "./work-array";

export type Balanced = {
  /** b[i][j] = 2^shift · a[order[i]][order[j]] · scale[j] / scale[i], block upper triangular */
  readonly matrix: Float64Array;
  readonly order: Int32Array;
  readonly scale: Float64Array;
  readonly shift: number;
};

const SAFE_EXPONENT = 300;
const MOST_ROUNDS = 40;

/**
 * Similar matrix, by a permutation to block triangular form and powers of two, whose rows and columns have like sizes.
 * Exact but for underflow of entries that are negligible beside the largest.
 *
 * Shapes    a n×n row-major → matrix n×n, order n, scale n (in the new order)
 * Throws    nothing: finite input is the caller's duty
 * Accuracy  exact; at most 40 rounds
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304, with strong components in place of their search for isolated
 *           rows; 2-norms with the diagonal: James, Langou & Lowery, On matrix balancing and eigenvector computation, 2014
 */
export function balance(a: Float64Array, n: number): Balanced {
  const { order, starts } = strongComponents(a, n);
  const matrix = workArray(n * n);
  const shift = safeShift(a);
  const factor = powerOfTwo(shift);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) matrix[i * n + j] = a[order[i] * n + order[j]] * factor;
  const scale = workArray(n).fill(1);
  for (let block = 0; block + 1 < starts.length; block++) scaleBlock(matrix, n, starts[block], starts[block + 1], scale);
  return { matrix, order, scale, shift };
}

/** Exponent of the power of two that brings the largest entry into the range where squares neither overflow nor vanish. */
export function safeShift(a: Float64Array): number {
  const largest = largestEntry(a);
  if (largest === 0) return 0;
  const e = exponentOf(largest);
  return e > SAFE_EXPONENT ? SAFE_EXPONENT - e : e < -SAFE_EXPONENT ? -SAFE_EXPONENT - e : 0;
}

/** Rows and columns of the whole matrix are scaled; only norms inside the diagonal block decide. */
function scaleBlock(b: Float64Array, n: number, from: number, to: number, scale: Float64Array): void {
  if (to - from < 2) return;
  for (let round = 0; round < MOST_ROUNDS; round++) {
    let settled = true;
    for (let i = from; i < to; i++) {
      let column = 0;
      let row = 0;
      for (let j = from; j < to; j++) {
        column += b[j * n + i] * b[j * n + i];
        row += b[i * n + j] * b[i * n + j];
      }
      column = Math.sqrt(column);
      row = Math.sqrt(row);
      if (column === 0 || row === 0) continue;
      const half = Math.round((exponentOf(row) - exponentOf(column)) / 2);
      const total = exponentOf(scale[i]) + half;
      if (half === 0 || Math.abs(total) > SAFE_EXPONENT) continue;
      const f = powerOfTwo(half);
      if (column * f + row / f >= 0.95 * (column + row)) continue;
      settled = false;
      scale[i] *= f;
      for (let j = 0; j < n; j++) b[i * n + j] /= f;
      for (let j = 0; j < n; j++) b[j * n + i] *= f;
    }
    if (settled) return;
  }
}
