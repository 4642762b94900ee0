import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { balance } from "../linalg/balance";
import { type ComplexVector, modulus } from "../linalg/complex";
import { eigensystem } from "../linalg/eigensystem";
import { eigenvalues } from "../linalg/eigenvalues";
import { flatProduct, fromFlat, pythagoras, toFlat } from "../linalg/flat";
import { flatNorm, frobeniusNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { type FlatSchur, flatSchur } from "../linalg/real-schur";
import { smallestSingularComplex } from "../linalg/singular-values";
import type { Complex } from "../plant/model";
import { eigenvalueAccuracy } from "../structure/eigenvalue-accuracy";
import { pencilEstimate } from "./pencil-screen";
import type { FlatProblem } from "./problem";
import { removeCrossTerm } from "./remove-cross-term";

/** How near a mode comes to being out of reach (or out of sight), relative to the norm of the tested matrix. */
export type ModeDistance = { readonly pole: Complex; readonly state: number; readonly distance: number };

/** Below this a computed eigenvalue may be a scattered copy of a multiple one (ε^(1/4), for blocks up to four). */
const SCATTER = 1e-3;
const ROUNDS = 12;

/** 1000 n ε: what rounding of the entries, amplified by an ordinary change of coordinates, can leave of an exact zero. */
function rankTolerance(n: number): number {
  return 1000 * n * Number.EPSILON;
}

/**
 * Refuses a plant with an unstable or marginal mode that no input reaches: it has no stabilising solution.
 *
 * Throws    not-stabilizable with the pole, its dominant state and the distance
 * Source    Popov, Belevitch & Hautus test on the plant balanced by powers of two, input columns scaled near one
 */
export function checkReach(problem: FlatProblem): void {
  const nearest = leastReachable(problem, 10 * rankTolerance(problem.n));
  if (nearest && nearest.distance <= rankTolerance(problem.n)) throw new NumericalError("not-stabilizable", nearest);
}

/** The same for a marginal mode that the weights do not see: throws unweighted-boundary-mode. */
export function checkSight(problem: FlatProblem): void {
  const hidden = hiddenBoundaryMode(problem);
  if (hidden) throw new NumericalError("unweighted-boundary-mode", hidden);
}

/**
 * Of the modes on or outside the boundary, the one nearest to being unreachable; null when there is none. Modes that a quick
 * look already finds further than `clear` are passed over.
 */
export function leastReachable({ n, m, a, b, sampled }: FlatProblem, clear: number): ModeDistance | null {
  const { A, scale, order } = balancedPlant(a, n);
  const B = new Matrix(n, m);
  for (let i = 0; i < n; i++) for (let j = 0; j < m; j++) B.set(i, j, b[order[i] * m + j] / scale[i]);
  unitColumns(B, frobeniusNorm(A) || 1);
  let least: ModeDistance | null = null;
  const slack = boundarySlack(A, sampled);
  const schur = flatSchur(toFlat(A), n);
  const reached = flatProduct(schur.qt, toFlat(B), n, n, m);
  for (const pole of settledPoles(A, sampled)) {
    if (pole.im < 0 || boundaryMargin(pole, sampled) > slack) continue;
    if (quickDistance({ schur, reached, n, m, sampled }, pole) > 2 * clear) continue;
    const found = settledDistance(A, pole, B, sampled);
    if (!least || found.distance < least.distance) least = { ...found, state: order[found.state] };
  }
  return least;
}

/** A mode on the boundary that [Q S; S' R] does not weight, if any. With a cross weight R must be positive definite for the test. */
function hiddenBoundaryMode(given: FlatProblem): ModeDistance | null {
  const problem = withoutCrossTerm(given);
  if (!problem) return null;
  const { n, a, q, sampled } = problem;
  const { A, scale, order } = balancedPlant(a, n);
  const slack = boundarySlack(A, sampled);
  const At = A.transpose();
  const Q = new Matrix(n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) Q.set(i, j, q[order[i] * n + order[j]] * scale[i]);
  unitColumns(Q, frobeniusNorm(A) || 1);
  for (const pole of settledPoles(A, sampled)) {
    if (pole.im < 0 || Math.abs(boundaryMargin(pole, sampled)) > slack) continue;
    const found = pencilDistance(At, pole, Q);
    if (found.distance <= rankTolerance(n)) return { pole, state: order[found.state], distance: found.distance };
  }
  return null;
}

/** Plant and weight after u = v - R⁻¹S'x, with what only rounding left of a weight put to zero; null where R is singular. */
function withoutCrossTerm(problem: FlatProblem): Pick<FlatProblem, "n" | "sampled" | "a" | "q"> | null {
  const { n, m, q, s } = problem;
  if (s.every((entry) => entry === 0)) return problem;
  try {
    const plain = removeCrossTerm(problem, "R");
    const unit = 32 * (n + m) * Number.EPSILON;
    const noise = (i: number, j: number) => unit * Math.sqrt(Math.abs(q[i * n + i])) * Math.sqrt(Math.abs(q[j * n + j]));
    const cleaned = plain.q.map((entry, at) => (Math.abs(entry) <= noise(Math.floor(at / n), at % n) ? 0 : entry));
    return { ...plain, q: cleaned };
  } catch (error) {
    if (error instanceof NumericalError && error.code === "not-positive-definite") return null;
    throw error;
  }
}

/**
 * Distance at the pole, or at a nearby unreachable value it is a rounded image of: computed copies of a multiple eigenvalue
 * scatter by a root of rounding, and the Rayleigh quotient of the left vector brings them back.
 */
function settledDistance(A: Matrix, pole: Complex, B: Matrix, sampled: boolean): ModeDistance {
  let best = { pole, ...pencilDistance(A, pole, B) };
  for (let round = 0; round < ROUNDS && best.distance < SCATTER && best.distance > rankTolerance(A.rows); round++) {
    const moved = rayleighQuotient(toFlat(A), A.rows, best.left);
    const next = { pole: moved, ...pencilDistance(A, moved, B) };
    if (!(isNear(moved, sampled, frobeniusNorm(A)) && next.distance < 0.5 * best.distance)) break;
    best = next;
  }
  return { pole: best.pole, state: best.state, distance: best.distance };
}

type Reach = {
  readonly schur: FlatSchur;
  readonly reached: Float64Array;
  readonly n: number;
  readonly m: number;
  readonly sampled: boolean;
};

/** What `settledDistance` finds, by estimates in the basis of the Schur form. */
function quickDistance({ schur, reached, n, m, sampled }: Reach, pole: Complex): number {
  const size = flatNorm(schur.t);
  const whole = pythagoras(size, flatNorm(reached));
  const relative = (value: number, at: Complex) => value / (whole + Math.sqrt(n) * modulus(at));
  let found = pencilEstimate(schur, n, reached, m, pole);
  let distance = relative(found.value, pole);
  for (let round = 0; round < ROUNDS && distance < SCATTER && distance > rankTolerance(n); round++) {
    const moved = rayleighQuotient(schur.t, n, found.left);
    found = pencilEstimate(schur, n, reached, m, moved);
    const next = relative(found.value, moved);
    if (!(isNear(moved, sampled, size) && next < 0.5 * distance)) break;
    distance = next;
  }
  return distance;
}

/** Near enough to the boundary, or outside, for the mode to count. */
function isNear(pole: Complex, sampled: boolean, size: number): boolean {
  return boundaryMargin(pole, sampled) <= Math.sqrt(Number.EPSILON) * Math.max(size, sampled ? 1 : 0);
}

/** w* A w for a unit vector w. */
function rayleighQuotient(a: Float64Array, n: number, { re, im }: ComplexVector): Complex {
  const value = { re: 0, im: 0 };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      value.re += a[i * n + j] * (re[i] * re[j] + im[i] * im[j]);
      value.im += a[i * n + j] * (re[i] * im[j] - im[i] * re[j]);
    }
  }
  return value;
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
  return sampled ? 1 - pythagoras(re, im) : -re;
}

function boundarySlack(A: Matrix, sampled: boolean): number {
  return 4 * A.rows * Number.EPSILON * boundarySize(A, sampled);
}

function boundarySize(A: Matrix, sampled: boolean): number {
  return Math.max(frobeniusNorm(A), sampled ? 1 : 0);
}

/** The eigenvalues, those put on the stability boundary that rounding alone may have moved off it, each by its own condition. */
function settledPoles(A: Matrix, sampled: boolean): Complex[] {
  const most = rankTolerance(A.rows) * boundarySize(A, sampled);
  const values = eigenvalues(A);
  if (!values.some((pole) => Math.abs(boundaryMargin(pole, sampled)) <= most)) return values;
  const spectrum = eigensystem(A);
  const accuracy = eigenvalueAccuracy(toFlat(A), A.rows, spectrum);
  const slack = boundarySlack(A, sampled);
  return spectrum.values.map((pole, k) => {
    const limit = Math.max(slack, Math.min(accuracy[k], most));
    return Math.abs(boundaryMargin(pole, sampled)) <= limit ? onBoundary(pole, sampled) : pole;
  });
}

function onBoundary({ re, im }: Complex, sampled: boolean): Complex {
  if (!sampled) return { re: 0, im };
  const size = pythagoras(re, im);
  return { re: re / size, im: im / size };
}

/** Smallest singular value of [A - pole I, B] over its Frobenius norm, its left vector and the largest place of that. */
function pencilDistance(A: Matrix, pole: Complex, B: Matrix): { distance: number; left: ComplexVector; state: number } {
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
  const size = pythagoras(frobeniusNorm(re), frobeniusNorm(im));
  const shares = Array.from(left.re, (x, i) => x * x + left.im[i] * left.im[i]);
  return { distance: size === 0 ? 0 : value / size, left, state: shares.indexOf(Math.max(...shares)) };
}
