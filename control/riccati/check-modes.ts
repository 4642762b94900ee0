import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat } from "../linalg/flat";
import { frobeniusNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { smallestSingularComplex } from "../linalg/singular-values";
import type { Complex } from "../plant/model";
import type { FlatProblem } from "./problem";

/** How near a mode comes to being out of reach (or out of sight), relative to the norm of the tested matrix. */
export type ModeDistance = { readonly pole: Complex; readonly state: number; readonly distance: number };

/** 1000 n ε: what rounding of the entries, amplified by an ordinary change of coordinates, can leave of an exact zero. */
function rankTolerance(n: number): number {
  return 1000 * n * Number.EPSILON;
}

/**
 * Refuses a plant with an unstable or marginal mode that no input reaches, and one with a marginal mode that the weights
 * do not see: neither has a stabilising solution.
 *
 * Throws    not-stabilizable, unweighted-boundary-mode, each with the pole, its dominant state and the distance
 * Source    Popov, Belevitch & Hautus tests on the plant balanced by powers of two, input columns scaled near one
 */
export function checkModes(problem: FlatProblem): void {
  const nearest = leastReachable(problem);
  if (nearest && nearest.distance <= rankTolerance(problem.n)) throw new NumericalError("not-stabilizable", nearest);
  const hidden = hiddenBoundaryMode(problem);
  if (hidden) throw new NumericalError("unweighted-boundary-mode", hidden);
}

/** Of the modes on or outside the boundary, the one nearest to being unreachable; null when there is none. */
export function leastReachable({ n, m, a, b, sampled }: FlatProblem): ModeDistance | null {
  const { A, scale, order } = balancedPlant(a, n);
  const B = new Matrix(n, m);
  for (let i = 0; i < n; i++) for (let j = 0; j < m; j++) B.set(i, j, b[order[i] * m + j] / scale[i]);
  unitColumns(B, Math.max(frobeniusNorm(A), Number.MIN_VALUE));
  let least: ModeDistance | null = null;
  const slack = boundarySlack(A, sampled);
  for (const pole of eigenvalues(A)) {
    if (pole.im < 0 || boundaryMargin(pole, sampled) > slack) continue;
    const { value, vector, size } = pencilDistance(A, pole, B);
    const distance = size === 0 ? 0 : value / size;
    if (!least || distance < least.distance) least = { pole, state: order[largestPlace(vector)], distance };
  }
  return least;
}

/** A mode on the boundary that [Q S; S' R] does not weight, if any. R must be positive definite for the test to be run. */
function hiddenBoundaryMode(problem: FlatProblem): ModeDistance | null {
  const { n, a, q, s, sampled } = problem;
  if (s.some((entry) => entry !== 0)) return null;
  const { A, scale, order } = balancedPlant(a, n);
  const slack = boundarySlack(A, sampled);
  const At = A.transpose();
  const Q = new Matrix(n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) Q.set(i, j, q[order[i] * n + order[j]] * scale[i]);
  unitColumns(Q, Math.max(frobeniusNorm(A), Number.MIN_VALUE));
  for (const pole of eigenvalues(A)) {
    if (pole.im < 0 || Math.abs(boundaryMargin(pole, sampled)) > slack) continue;
    const { value, vector, size } = pencilDistance(At, pole, Q);
    const distance = size === 0 ? 0 : value / size;
    if (distance <= rankTolerance(n)) return { pole, state: order[largestPlace(vector)], distance };
  }
  return null;
}

function balancedPlant(a: Float64Array, n: number): { A: Matrix; scale: Float64Array; order: Int32Array } {
  const { matrix, scale, order } = balance(a, n);
  return { A: fromFlat(matrix, n, n), scale, order };
}

/** Columns to a largest entry of about the given size, so that units of an input do not count as weakness. */
function unitColumns(B: Matrix, size: number): void {
  for (let j = 0; j < B.columns; j++) {
    let largest = 0;
    for (let i = 0; i < B.rows; i++) largest = Math.max(largest, Math.abs(B.get(i, j)));
    if (largest === 0) continue;
    const factor = powerOfTwo(exponentOf(size) - exponentOf(largest));
    for (let i = 0; i < B.rows; i++) B.set(i, j, B.get(i, j) * factor);
  }
}

/** Distance inside the stability boundary: -Re s, or 1 - |z|. */
export function boundaryMargin({ re, im }: Complex, sampled: boolean): number {
  return sampled ? 1 - Math.sqrt(re * re + im * im) : -re;
}

function boundarySlack(A: Matrix, sampled: boolean): number {
  return 4 * A.rows * Number.EPSILON * Math.max(frobeniusNorm(A), sampled ? 1 : 0);
}

/** Smallest singular value of [A - pole I, B], its left vector's sizes, and the Frobenius norm of the matrix. */
function pencilDistance(A: Matrix, pole: Complex, B: Matrix): { value: number; vector: number[]; size: number } {
  const n = A.rows;
  const re = Matrix.zeros(n, n + B.columns);
  const im = Matrix.zeros(n, n + B.columns);
  re.setSubMatrix(A, 0, 0);
  re.setSubMatrix(B, 0, n);
  for (let i = 0; i < n; i++) {
    re.set(i, i, re.get(i, i) - pole.re);
    im.set(i, i, -pole.im);
  }
  const { value, left } = smallestSingularComplex(re, im);
  const vector = Array.from(left.re, (x, i) => x * x + left.im[i] * left.im[i]);
  const size = frobeniusNorm(re);
  const turn = frobeniusNorm(im);
  return { value, vector, size: Math.sqrt(size * size + turn * turn) };
}

function largestPlace(vector: readonly number[]): number {
  return vector.indexOf(Math.max(...vector));
}
