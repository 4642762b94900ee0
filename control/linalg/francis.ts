import { acceleratedChase } from "../accelerator/accelerated-schur";
import { NumericalError } from "../errors";
import { type Chase, chaseByLoops } from "./bulge-chase";
import { largestEntry } from "./flat";
import { powerOfTwo } from "./power-of-two";
import { standardiseBlock } from "./standardise-block";

const EPS = Number.EPSILON / 2;
const TINY = 2.2250738585072014e-308;
/** Far more than the two or three sweeps an eigenvalue usually takes. */
const SWEEP_LIMIT = 60;
/** From this sweep on, what stands below the diagonal may be a little more than rounding of the whole. */
const PATIENCE = 30;

type Block = { readonly h: Float64Array; readonly n: number };

/**
 * Francis double-shift iteration from Hessenberg to real Schur form, in place; 2×2 blocks end in standard form.
 *
 * Shapes    h n×n upper Hessenberg, overwritten; qt n×n or null, rows multiplied along. With full = false only the
 *           diagonal blocks are right afterwards
 * Throws    no-convergence after 60 sweeps on one eigenvalue
 * Accuracy  backward stable, about 10 n³ flops (25 n³ with full and qt)
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.5; deflation test of Ahues & Tisseur,
 *           LAPACK Working Note 122, 1997
 */
export function francisIteration(h: Float64Array, n: number, full: boolean, qt: Float64Array | null): void {
  const accelerated = acceleratedChase(h, n, full, qt);
  deflateAll(accelerated ?? chaseByLoops(h, n, full, qt));
  if (!accelerated) return;
  h.set(accelerated.h);
  if (qt && accelerated.qt) qt.set(accelerated.qt);
}

function deflateAll(chase: Chase): void {
  const { h, n } = chase;
  const small = TINY * (n / EPS);
  let end = n - 1;
  while (end >= 0) {
    let start = 0;
    let sweep = 0;
    for (; sweep <= SWEEP_LIMIT; sweep++) {
      start = deflatedStart(h, n, end, sweep < PATIENCE ? small : stalledSmall(h, n, end, sweep));
      if (start > 0) h[start * n + start - 1] = 0;
      if (start >= end - 1) break;
      doubleShiftSweep(chase, start, end, sweep);
    }
    if (start < end - 1) throw new NumericalError("no-convergence", { routine: "francis-iteration", limit: SWEEP_LIMIT });
    if (start === end - 1) standardiseAt(chase, start);
    end = start - 1;
  }
}

/**
 * Clusters of nearly defective eigenvalues can keep a subdiagonal entry hovering above its neighbours' rounding: up to 2^10 of
 * the rounding of the largest entry is then set to zero, which is a backward error like that of the reduction.
 */
function stalledSmall(h: Float64Array, n: number, end: number, sweep: number): number {
  return largestEntry(h.subarray(0, (end + 1) * n)) * EPS * powerOfTwo(Math.min(sweep - PATIENCE, 10));
}

/** Start of the unreduced block that ends at `end`. */
function deflatedStart(h: Float64Array, n: number, end: number, small: number): number {
  for (let k = end; k > 0; k--) {
    const below = Math.abs(h[k * n + k - 1]);
    if (below <= small) return k;
    const corner = h[(k - 1) * n + k - 1];
    const here = h[k * n + k];
    let size = Math.abs(corner) + Math.abs(here);
    if (size === 0) {
      if (k >= 2) size += Math.abs(h[(k - 1) * n + k - 2]);
      if (k + 1 <= end) size += Math.abs(h[(k + 1) * n + k]);
    }
    if (below > 2 * EPS * size) continue;
    const above = Math.abs(h[(k - 1) * n + k]);
    const gap = Math.abs(corner - here);
    const ab = Math.max(below, above);
    const ba = Math.min(below, above);
    const aa = Math.max(Math.abs(here), gap);
    const bb = Math.min(Math.abs(here), gap);
    const sum = aa + ab;
    if (ba * (ab / sum) <= Math.max(small, 2 * EPS * (bb * (aa / sum)))) return k;
  }
  return 0;
}

/** Sum and product data of the two shifts: the trailing 2×2 block, or an exceptional one every tenth sweep. */
function shiftBlock({ h, n }: Block, start: number, end: number, sweep: number): [number, number, number, number] {
  if (sweep > 0 && sweep % 20 === 0) {
    const s = Math.abs(h[end * n + end - 1]) + Math.abs(h[(end - 1) * n + end - 2]);
    const d = 0.75 * s + h[end * n + end];
    return [d, -0.4375 * s, s, d];
  }
  if (sweep > 0 && sweep % 10 === 0) {
    const s = Math.abs(h[(start + 1) * n + start]) + Math.abs(h[(start + 2) * n + start + 1]);
    const d = 0.75 * s + h[start * n + start];
    return [d, -0.4375 * s, s, d];
  }
  return [h[(end - 1) * n + end - 1], h[(end - 1) * n + end], h[end * n + end - 1], h[end * n + end]];
}

/** Two shifts as [re1, im1, re2, im2]; of two real ones the one nearer the corner is used twice. */
function shifts(block: [number, number, number, number]): [number, number, number, number] {
  const [a, b, c, d] = block;
  const scale = Math.abs(a) + Math.abs(b) + Math.abs(c) + Math.abs(d);
  if (scale === 0) return [0, 0, 0, 0];
  const h11 = a / scale;
  const h22 = d / scale;
  const middle = (h11 + h22) / 2;
  const determinant = (h11 - middle) * (h22 - middle) - (b / scale) * (c / scale);
  const root = Math.sqrt(Math.abs(determinant));
  if (determinant >= 0) return [middle * scale, root * scale, middle * scale, -root * scale];
  const one = middle + root;
  const two = middle - root;
  const real = (Math.abs(one - h22) <= Math.abs(two - h22) ? one : two) * scale;
  return [real, 0, real, 0];
}

function doubleShiftSweep(chase: Chase, start: number, end: number, sweep: number): void {
  const { h, n } = chase;
  const [re1, im1, re2, im2] = shifts(shiftBlock(chase, start, end, sweep));
  let [v0, v1, v2] = [0, 0, 0];
  let m = end - 2;
  for (; m >= start; m--) {
    const at = m * n + m;
    const here = h[at];
    const below = h[at + n];
    const next = h[at + n + 1];
    const scale = Math.abs(here - re2) + Math.abs(im2) + Math.abs(below);
    const ratio = below / scale;
    v0 = ratio * h[at + 1] + (here - re1) * ((here - re2) / scale) - im1 * (im2 / scale);
    v1 = ratio * (here + next - re1 - re2);
    v2 = ratio * h[at + 2 * n + 1];
    if (m === start) break;
    const rest = Math.abs(v1) + Math.abs(v2);
    const sum = Math.abs(v0) + rest;
    const neighbours = Math.abs(h[at - n - 1]) + Math.abs(here) + Math.abs(next);
    if (Math.abs(h[at - 1]) * (rest / sum) <= 2 * EPS * (Math.abs(v0) / sum) * neighbours) break;
  }
  chase.sweep(m, start, end, v0, v1, v2);
}

/** Brings the 2×2 diagonal block at k to standard form and turns the rest of the matrix along. */
export function standardiseAt({ h, n, full, qt }: Pick<Chase, "h" | "n" | "full" | "qt">, k: number): void {
  const at = k * n + k;
  const block = standardiseBlock(h[at], h[at + 1], h[at + n], h[at + n + 1]);
  h[at] = block.a;
  h[at + 1] = block.b;
  h[at + n] = block.c;
  h[at + n + 1] = block.d;
  const { cos, sin } = block;
  if (full) {
    rotateRows(h, n, k, cos, sin, k + 2);
    for (let i = 0; i < k; i++) {
      const x = h[i * n + k];
      const y = h[i * n + k + 1];
      h[i * n + k] = cos * x + sin * y;
      h[i * n + k + 1] = cos * y - sin * x;
    }
  }
  if (qt) rotateRows(qt, n, k, cos, sin, 0);
}

function rotateRows(h: Float64Array, n: number, k: number, cos: number, sin: number, first: number): void {
  for (let j = first; j < n; j++) {
    const x = h[k * n + j];
    const y = h[(k + 1) * n + j];
    h[k * n + j] = cos * x + sin * y;
    h[(k + 1) * n + j] = cos * y - sin * x;
  }
}
