import type { Complex } from "../plant/model";
import { logarithmicDerivative, type WideComplex } from "./hyman-step";
import { reduceWide } from "./wide-hessenberg";
import type { WideRows } from "./wide-rows";

const MOST_ROUNDS = 60;
/** A root stands still once its step is this small beside its size, or beside its way from where it started. */
const STILL = Number.EPSILON / 8;
const NEAR_ENOUGH = 1e-4;

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
  const columns = transposed(closed, n);
  return follow(columns, n, apart(starts), starts, true) ?? follow(columns, n, scattered(starts), starts, false);
}

/** `mirrored`: pairs stay conjugate and real roots real, which holds unless two real ones have met. */
function follow(
  columns: WideRows,
  n: number,
  roots: WideComplex[],
  starts: readonly Complex[],
  mirrored: boolean,
): WideComplex[] | null {
  const resting = new Array<boolean>(n).fill(false);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    for (let k = 0; k < n; k++) {
      if (resting[k] || (mirrored && starts[k].im < 0)) continue;
      const twin = mirrored && starts[k].im !== 0 ? k + 1 : k;
      const step = aberthStep(columns, n, roots, k);
      if (!Number.isFinite(step.re) || !Number.isFinite(step.im)) return null;
      roots[k] = moved(roots[k], { re: -step.re, im: mirrored && twin === k ? 0 : -step.im });
      if (twin !== k) roots[twin] = { ...roots[k], im: -roots[k].im, imLow: -roots[k].imLow };
      resting[k] = standsStill(roots[k], starts[k], step);
      resting[twin] = resting[k];
    }
    if (!resting.includes(false)) return roots;
  }
  return null;
}

function aberthStep(columns: WideRows, n: number, roots: readonly WideComplex[], k: number): Complex {
  const slope = logarithmicDerivative(columns, n, roots[k]);
  if (slope === null) return { re: 0, im: 0 };
  let { re, im } = slope;
  roots.forEach((other, j) => {
    if (j === k) return;
    const x = roots[k].re - other.re + (roots[k].reLow - other.reLow);
    const y = roots[k].im - other.im + (roots[k].imLow - other.imLow);
    const square = x * x + y * y;
    re -= x / square;
    im += y / square;
  });
  const square = re * re + im * im;
  return { re: re / square, im: -im / square };
}

function standsStill(root: WideComplex, start: Complex, step: Complex): boolean {
  const size = Math.abs(step.re) + Math.abs(step.im);
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

function transposed({ hi, lo }: WideRows, n: number): WideRows {
  const out = { hi: new Float64Array(n * n), lo: new Float64Array(n * n) };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      out.hi[j * n + i] = hi[i * n + j];
      out.lo[j * n + i] = lo[i * n + j];
    }
  }
  return out;
}
