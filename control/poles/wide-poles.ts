import { pythagoras } from "../linalg/flat";
import type { Complex } from "../plant/model";
import { type HymanMatrix, logarithmicDerivative, prepareHyman, type WideComplex } from "./hyman-step";
import { reduceWide } from "./wide-hessenberg";
import type { WideRows } from "./wide-rows";

const MOST_ROUNDS = 60;
/** A root stands still once its step is this small beside its size, or this small beside its way from where it started. */
const STILL = Number.EPSILON / 8;
const NEAR_ENOUGH = 1e-4;
const SMALLEST_SQUARE = 2 ** -960;

/**
 * Eigenvalues of a matrix kept with some 32 digits, from starts near them: what the poles of a loop really are where plain
 * eigenvalues are too coarse to tell. All roots of the characteristic polynomial are followed at once.
 *
 * Shapes    closed n×n, overwritten; n starts, pairs adjacent with im > 0 first → n values, one from each start
 * Units     those of the matrix
 * Throws    nothing; null when 60 rounds do not bring every root to rest
 * Accuracy  condition of the eigenvalue times n 1e-31 of the norm; the way from the start to four digits
 * Source    Aberth, Math. Comp. 27 (1973) 339-344; Hyman's determinant: Wilkinson, The Algebraic Eigenvalue Problem, 1965, 7.11
 */
export function widePoles(closed: WideRows, n: number, starts: readonly Complex[]): WideComplex[] | null {
  reduceWide(closed, n);
  const matrix = prepareHyman(closed, n);
  return follow(matrix, apart(starts), starts, true) ?? follow(matrix, scattered(starts), starts, false);
}

/** `mirrored`: pairs stay conjugate and real roots real, which holds unless two real ones have met. */
function follow(matrix: HymanMatrix, roots: WideComplex[], starts: readonly Complex[], mirrored: boolean): WideComplex[] | null {
  const resting = new Array<boolean>(matrix.n).fill(false);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    // One step squares a distance that is small beside the gap to the next root, if that holds for all of them at once.
    let allClose = true;
    for (let k = 0; k < matrix.n; k++) {
      if (resting[k] || (mirrored && starts[k].im < 0)) continue;
      const twin = mirrored && starts[k].im !== 0 ? k + 1 : k;
      const { step, gap } = aberthStep(matrix, roots, k);
      if (!Number.isFinite(step.re) || !Number.isFinite(step.im)) return null;
      roots[k] = moved(roots[k], { re: -step.re, im: mirrored && twin === k ? 0 : -step.im });
      if (twin !== k) roots[twin] = { ...roots[k], im: -roots[k].im, imLow: -roots[k].imLow };
      const size = Math.abs(step.re) + Math.abs(step.im);
      if (size > NEAR_ENOUGH * gap) allClose = false;
      resting[k] = standsStill(roots[k], starts[k], size);
      resting[twin] = resting[k];
    }
    if (allClose || !resting.includes(false)) return roots;
  }
  return null;
}

/** The step to take back, and the distance to the nearest other root. */
function aberthStep(matrix: HymanMatrix, roots: readonly WideComplex[], k: number): { step: Complex; gap: number } {
  const slope = logarithmicDerivative(matrix, roots[k]);
  let gap = Number.POSITIVE_INFINITY;
  let { re, im } = slope ?? { re: 0, im: 0 };
  for (let j = 0; j < roots.length; j++) {
    if (j === k) continue;
    const other = roots[j];
    const x = roots[k].re - other.re + (roots[k].reLow - other.reLow);
    const y = roots[k].im - other.im + (roots[k].imLow - other.imLow);
    gap = Math.min(gap, pythagoras(x, y));
    const push = reciprocal(x, y);
    re -= push.re;
    im -= push.im;
  }
  return { step: slope === null ? { re: 0, im: 0 } : reciprocal(re, im), gap };
}

/** 1 / (x + iy), also where the square of the size leaves the range of numbers: a step of zero would look like rest. */
function reciprocal(x: number, y: number): Complex {
  const square = x * x + y * y;
  if (square > SMALLEST_SQUARE && square < 1 / SMALLEST_SQUARE) return { re: x / square, im: -y / square };
  const size = Math.max(Math.abs(x), Math.abs(y));
  const [a, b] = [x / size, y / size];
  const turned = a * a + b * b;
  return { re: a / turned / size, im: -b / turned / size };
}

function standsStill(root: WideComplex, start: Complex, size: number): boolean {
  const way = Math.abs(root.re - start.re + root.reLow) + Math.abs(root.im - start.im + root.imLow);
  return size <= NEAR_ENOUGH * way || size <= STILL * (Math.abs(root.re) + Math.abs(root.im));
}

function moved({ re, im, reLow, imLow }: WideComplex, step: Complex): WideComplex {
  const x = sum(re, reLow, step.re);
  const y = sum(im, imLow, step.im);
  return { re: x.hi, reLow: x.lo, im: y.hi, imLow: y.lo };
}

function sum(hi: number, lo: number, term: number): { hi: number; lo: number } {
  const total = hi + term;
  const part = total - hi;
  const rest = hi - (total - part) + (term - part) + lo;
  return { hi: total + rest, lo: rest - (total + rest - total) };
}

/** The starts as they are, repeated ones moved apart by a little more each time. */
function apart(starts: readonly Complex[]): WideComplex[] {
  const floor = starts.reduce((size, { re, im }) => Math.max(size, Math.abs(re) + Math.abs(im)), 0) || 1;
  return starts.map(({ re, im }, k) => {
    const before = starts.slice(0, k).filter((other) => other.re === re && other.im === im).length;
    const shift = before * Math.sqrt(Number.EPSILON) * (Math.abs(re) + Math.abs(im) || floor);
    return { re: re + shift, im, reLow: 0, imLow: 0 };
  });
}

/** The starts off their places by up to 1e-3 in every direction, so that real roots can leave the axis. */
function scattered(starts: readonly Complex[]): WideComplex[] {
  const floor = starts.reduce((size, { re, im }) => Math.max(size, Math.abs(re) + Math.abs(im)), 0) || 1;
  return starts.map(({ re, im }, k) => {
    const size = (Math.abs(re) + Math.abs(im) || floor) / 1024;
    const turned = (k + 1) * 0.6180339887498949;
    const side = k % 2 === 0 ? 1 : -1;
    return { re: re + size * (turned - Math.floor(turned) - 0.5), im: im + side * size, reLow: 0, imLow: 0 };
  });
}
