import { solveCholesky } from "../linalg/cholesky";
import type { Wide } from "../linalg/double-double";
import { flatProduct, flatTranspose } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Gain } from "./gain";
import type { FlatProblem } from "./problem";
import { diagonalMajorant, residualFloor } from "./residual-sizes";

/** First-order bounds: x_ij before rounding is off by at most x_i x_j, k_ij by at most input_i right_j, in scaled coordinates. */
export type SolutionError = {
  readonly x: Float64Array;
  readonly input: Float64Array;
  readonly right: Float64Array;
  /** Largest error of a row of X or K relative to the row, in the caller's units. */
  readonly rows: number;
};

/** An approximate solution with the residual of the equation there. */
export type Approximation = {
  readonly x: Wide;
  readonly gain: Gain;
  readonly loop: Float64Array;
  readonly residual: Float64Array;
};

/** Roundings of the figures made here, and terms of second order. */
const SLACK = 2;

/** Diagonal D with -D ≤ residual ≤ D, the rounding of the residual included. */
export function errorMajorant(problem: FlatProblem, { x, gain, residual }: Approximation): Float64Array {
  const sizes = residualFloor(problem, x.hi, gain.k.hi);
  for (let i = 0; i < sizes.length; i++) sizes[i] = SLACK * (sizes[i] + Math.abs(residual[i]));
  return diagonalMajorant(sizes, problem.n);
}

/** Whether the residual has come down to within 1e4 of what rounding in double-double leaves: beyond that nothing converges. */
export function isRounding(problem: FlatProblem, { x, gain, residual }: Approximation): boolean {
  return flatNorm(residual) <= 1e4 * flatNorm(residualFloor(problem, x.hi, gain.k.hi));
}

/** Y ≥ ± the error of X from that of the unit residual: quicker than a solve of its own, and less sharp. */
export function uniformMajorant(problem: FlatProblem, now: Approximation, amplification: Float64Array): Float64Array {
  const { n } = problem;
  const d = errorMajorant(problem, now);
  let largest = 0;
  for (let i = 0; i < n; i++) largest = Math.max(largest, d[i * n + i]);
  return amplification.map((entry) => largest * entry);
}

/**
 * What -Y ≤ error of X ≤ Y means for each entry of X and of K: |u'(error) v| ≤ √(u'Yu · v'Yv).
 *
 * Shapes    majorant Y n×n symmetric positive semidefinite; units n, as for `refine`
 * Accuracy  to first order in the error
 * Source    Cauchy-Schwarz in the seminorm of Y; Lyapunov operators of stable loops preserve order
 */
export function solutionError(
  problem: FlatProblem,
  { x, gain, loop }: Approximation,
  majorant: Float64Array,
  units: Float64Array,
): SolutionError {
  const { n, m, b, sampled } = problem;
  const own = rootOfDiagonal(n, (i) => majorant[i * n + i]);
  const through = solveCholesky(gain.factor, m, flatTranspose(b, n, m), n);
  const input = quadraticRoots(through, majorant, m, n);
  const right = sampled ? quadraticRoots(flatTranspose(loop, n, n), majorant, n, n) : own;
  const rest = gain.uncertainty / (flatNorm(gain.k.hi) || 1);
  const ownSize = weightedNorm(own, units, 0, n);
  const rightSize = weightedNorm(right, units, 0, n);
  let rows = 0;
  for (let i = 0; i < n; i++) rows = larger(rows, own[i] * ownSize, weightedNorm(x.hi, units, i * n, n), 0);
  for (let i = 0; i < m; i++) rows = larger(rows, input[i] * rightSize, weightedNorm(gain.k.hi, units, i * n, n), rest);
  return { x: own, input, right, rows };
}

/** The larger of the two relative errors; a row of exact zeros counts as right. */
function larger(worst: number, error: number, size: number, rest: number): number {
  if (size === 0) return worst;
  const relative = error / size + rest;
  return Math.max(relative, worst);
}

/** √(u'Yu) for every row u, with what rounding may hide of it. */
function quadraticRoots(u: Float64Array, y: Float64Array, rows: number, n: number): Float64Array {
  const product = flatProduct(u, y, rows, n, n);
  const unit = n * Number.EPSILON;
  return rootOfDiagonal(rows, (i) => {
    let sum = 0;
    let size = 0;
    for (let j = 0; j < n; j++) {
      const term = product[i * n + j] * u[i * n + j];
      sum += term;
      size += Math.abs(u[i * n + j]) * Math.sqrt(Math.abs(y[j * n + j]));
    }
    return Math.abs(sum) + unit * size * size;
  });
}

function rootOfDiagonal(n: number, entry: (i: number) => number): Float64Array {
  return Float64Array.from({ length: n }, (_, i) => Math.sqrt(Math.abs(entry(i))));
}

function weightedNorm(row: Float64Array, units: Float64Array, from: number, n: number): number {
  let sum = 0;
  for (let j = 0; j < n; j++) {
    const entry = row[from + j] * units[j];
    sum += entry * entry;
  }
  return Math.sqrt(sum);
}
