import { type BlockPair, solveBlockPair } from "./block-pair";
import { largestEntry } from "./flat";
import { blockSize } from "./schur-values";
import { workArray } from "./work-array";

/** What the passes of one call share: T, the right side that turns into Y, and in the sampled case Y T' of the columns at hand. */
type Work = {
  readonly t: Float64Array;
  readonly n: number;
  readonly y: Float64Array;
  readonly gathered: Float64Array;
  readonly pair: BlockPair;
};

/**
 * Solves T Y + Y T' = C, or T Y T' - Y = C when sampled, for quasi-triangular T and symmetric C; C is overwritten by Y.
 *
 * Shapes    t n×n, c n×n
 * Throws    singular with the row of the block where two eigenvalues cancel (sum zero, or product one when sampled)
 * Accuracy  residual c n ε |T||Y|; 2 n³ flops
 * Source    Bartels & Stewart, Commun. ACM 15 (1972) 820-826; Barraud, IEEE Trans. Autom. Control 22 (1977) 883-885
 */
export function solveTriangularLyapunov(t: Float64Array, n: number, c: Float64Array, sampled: boolean): void {
  const starts: number[] = [];
  for (let k = 0; k < n; k += blockSize(t, n, k)) starts.push(k);
  const size = largestEntry(t);
  const floor = Number.MIN_VALUE + Number.EPSILON * Number.EPSILON * (sampled ? 1 + size * size : size);
  const pair = { system: workArray(16), right: workArray(4), floor };
  const work = { t, n, y: c, gathered: workArray(sampled ? 2 * n : 0), pair };
  for (let bj = starts.length - 1; bj >= 0; bj--) {
    const j = starts[bj];
    const q = (starts[bj + 1] ?? n) - j;
    if (sampled) gatherColumns(work, j, q);
    for (let bi = bj; bi >= 0; bi--) {
      const i = starts[bi];
      const p = (starts[bi + 1] ?? n) - i;
      if (sampled) sampledRight(work, i, p, j, q);
      else continuousRight(work, i, p, j, q);
      solveBlockPair(t, n, i, p, j, q, sampled, pair);
      for (let a = 0; a < p; a++)
        for (let b = 0; b < q; b++) c[(i + a) * n + j + b] = c[(j + b) * n + i + a] = pair.right[a * q + b];
      if (sampled) extendGathered(work, i, p, j, q);
    }
  }
}

/** C_ij - Σ_{k after i} T_ik Y_kj - Σ_{k after j} Y_ik T_jk, both sums along rows thanks to symmetry. */
function continuousRight({ t, n, y, pair: { right } }: Work, i: number, p: number, j: number, q: number): void {
  for (let a = 0; a < p; a++) {
    const row = (i + a) * n;
    const at = a * q;
    if (q === 1) right[at] = y[row + j] - dot(t, row, y, j * n, i + p, n) - dot(t, j * n, y, row, j + q, n);
    else {
      twoDots(t, row, y, j * n, n, i + p, right, at);
      const [first, second] = [right[at], right[at + 1]];
      twoDots(y, row, t, j * n, n, j + q, right, at);
      right[at] = y[row + j] - first - right[at];
      right[at + 1] = y[row + j + 1] - second - right[at + 1];
    }
  }
}

/** Σ x_k y_k for from ≤ k < to, summed as the even and the odd ones. */
function dot(x: Float64Array, atX: number, y: Float64Array, atY: number, from: number, to: number): number {
  let even = 0;
  let odd = 0;
  let k = from;
  for (; k + 1 < to; k += 2) {
    even += x[atX + k] * y[atY + k];
    odd += x[atX + k + 1] * y[atY + k + 1];
  }
  if (k < to) even += x[atX + k] * y[atY + k];
  return even + odd;
}

/** The dots of a row of x with two neighbouring rows of y, from place `from` to the end, into out. */
function twoDots(
  x: Float64Array,
  atX: number,
  y: Float64Array,
  atY: number,
  n: number,
  from: number,
  out: Float64Array,
  at: number,
): void {
  let [a, b, c, d] = [0, 0, 0, 0];
  let k = from;
  for (; k + 1 < n; k += 2) {
    const u = x[atX + k];
    const v = x[atX + k + 1];
    a += u * y[atY + k];
    b += v * y[atY + k + 1];
    c += u * y[atY + n + k];
    d += v * y[atY + n + k + 1];
  }
  if (k < n) {
    a += x[atX + k] * y[atY + k];
    c += x[atX + k] * y[atY + n + k];
  }
  out[at] = a + b;
  out[at + 1] = c + d;
}

/** For every row k: Σ_{l after j} Y_kl T_jl, plus Y_kj T_jj' for the rows below block j. Column b of it lies in row b. */
function gatherColumns({ t, n, y, gathered }: Work, j: number, q: number): void {
  for (let b = 0; b < q; b++)
    for (let k = 0; k < n; k++) gathered[b * n + k] = dot(y, k * n, t, (j + b) * n, k >= j + q ? j : j + q, n);
}

/** Adds Y_ij T_jj' once block (i, j) is known. */
function extendGathered({ t, n, gathered, pair: { right } }: Work, i: number, p: number, j: number, q: number): void {
  for (let a = 0; a < p; a++) {
    for (let b = 0; b < q; b++) {
      for (let l = 0; l < q; l++) gathered[b * n + i + a] += right[a * q + l] * t[(j + b) * n + j + l];
    }
  }
}

function sampledRight({ t, n, y, gathered, pair: { right } }: Work, i: number, p: number, j: number, q: number): void {
  for (let a = 0; a < p; a++) {
    const row = (i + a) * n;
    for (let b = 0; b < q; b++) right[a * q + b] = y[row + j + b] - dot(t, row, gathered, b * n, i, n);
  }
}
