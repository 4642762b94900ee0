import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { balance, safeShift } from "./balance";
import { type Split, split, type Wide, wideProduct, wideTranspose } from "./double-double";
import { flatProduct, flatProductInto, flatTranspose, fromFlat, largestEntry, toFlat } from "./flat";
import { flatNorm } from "./norms";
import { powerOfTwo, timesPowerOfTwo } from "./power-of-two";
import { type FlatSchur, flatSchur } from "./real-schur";
import { requireFinite, requireShape, requireSquare, requireSymmetric } from "./require";
import { requireRepresentable } from "./require-representable";
import { solveTriangularLyapunov } from "./triangular-lyapunov";
import { workArray, workScope } from "./work-array";

export type LyapunovProblem = { readonly A: Matrix; readonly Q: Matrix; readonly timeBase: "continuous" | "sampled" };
export type LyapunovSolution = { readonly X: Matrix; readonly residual: number; readonly bound: number };

/** One or two are usual; more only where the Schur form alone gives few digits. */
const REFINEMENTS = 6;
/** What the next step may still change, beside the largest entry of its row. */
const SETTLED = powerOfTwo(-62);

/**
 * Solves A X + X A' + Q = 0, or A X A' - X + Q = 0 for a sampled plant: for stable A and positive semidefinite Q the
 * covariance or gramian. A need not be stable as long as no two eigenvalues cancel.
 *
 * Shapes    A n×n, Q n×n symmetric → X n×n symmetric
 * Units     [X] = [Q] / [A], sampled [X] = [Q]
 * Throws    shape-mismatch; not-finite; not-symmetric; singular when two eigenvalues add to zero (multiply to one);
 *           too-large; inaccurate when the residual stays above the bound; no-convergence
 * Accuracy  residual relative to |A||X| + |Q| after balancing, held against 4 n ε; refined with double-double residuals
 * Source    Bartels & Stewart, Commun. ACM 15 (1972) 820-826; Barraud, IEEE Trans. Autom. Control 22 (1977) 883-885
 */
export function solveLyapunov(problem: LyapunovProblem): LyapunovSolution {
  return workScope(() => solve(problem));
}

function solve({ A, Q, timeBase }: LyapunovProblem): LyapunovSolution {
  requireSquare("A", A);
  requireShape("Q", Q, A.rows, A.rows);
  requireFinite("A", A);
  requireFinite("Q", Q);
  requireSymmetric("Q", Q);
  const n = A.rows;
  const sampled = timeBase === "sampled";
  const balanced = balance(toFlat(A), n);
  const { order, scale } = balanced;
  if (sampled && balanced.shift < 0) throw new NumericalError("too-large", { what: "A", limit: powerOfTwo(300) });
  // A sampled equation is not homogeneous in A: of a tiny A it is solved as it stands.
  const shift = sampled ? 0 : balanced.shift;
  const a = sampled ? timesPower(balanced.matrix, -balanced.shift) : balanced.matrix;
  const weight = balancedWeight(toFlat(Q), n, order, scale);
  // X is proportional to Q, which is brought to ordinary size.
  const lift = safeShift(weight);
  const { x, residual } = refine(a, timesPower(weight, lift), n, sampled);
  const bound = 4 * n * Number.EPSILON;
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
  const whole = workArray(n * n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) whole[order[i] * n + order[j]] = x[i * n + j] * scale[i] * scale[j];
  const solution = timesPower(whole, shift - lift);
  requireRepresentable("solution", solution);
  return { X: fromFlat(solution, n, n), residual, bound };
}

function timesPower(a: Float64Array, exponent: number): Float64Array {
  return exponent === 0 ? a : a.map((entry) => timesPowerOfTwo(entry, exponent));
}

/** Q in the balanced coordinates, made exactly symmetric. */
function balancedWeight(q: Float64Array, n: number, order: Int32Array, scale: Float64Array): Float64Array {
  const balanced = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const mean = 0.5 * q[order[i] * n + order[j]] + 0.5 * q[order[j] * n + order[i]];
      balanced[i * n + j] = balanced[j * n + i] = mean / scale[i] / scale[j];
    }
  }
  return balanced;
}

/** X by the Schur form, then corrected from double-double residuals until what is left lies below the last digit of every row. */
function refine(a: Float64Array, q: Float64Array, n: number, sampled: boolean): { x: Float64Array; residual: number } {
  const schur = flatSchur(a, n);
  const parts = split(a);
  const x = { hi: solveLyapunovBySchur(schur, n, q, sampled), lo: workArray(n * n) };
  const moved = workArray(n * n);
  let defect = q;
  let before = largestEntry(x.hi);
  for (let round = 0; round < REFINEMENTS; round++) {
    defect = lyapunovDefect(parts, x, q, n, sampled);
    const step = solveLyapunovBySchur(schur, n, defect, sampled);
    const size = largestEntry(step);
    takeStep(x, step, moved);
    if (!(size > 0) || isSettled(x.hi, step, n, size / before)) break;
    before = size;
  }
  const size = flatNorm(x.hi) * (sampled ? 1 + flatNorm(a) * flatNorm(a) : 2 * flatNorm(a)) + flatNorm(q);
  moveDefect(a, defect, moved, n, sampled);
  return { x: x.hi, residual: size === 0 ? 0 : flatNorm(defect) / size };
}

/** Adds the step to x; `moved` tells how far x.hi alone then lies from the old x. */
function takeStep({ hi, lo }: Wide, step: Float64Array, moved: Float64Array): void {
  for (let at = 0; at < hi.length; at++) {
    const old = hi[at];
    const total = old + step[at];
    const part = total - old;
    const below = lo[at] + (old - (total - part) + (step[at] - part));
    hi[at] = total + below;
    moved[at] = hi[at] - old - lo[at];
    lo[at] = below - (hi[at] - total);
  }
}

/** Whether the next step, smaller by the same ratio, stays below the rounding of each row's largest entry. */
function isSettled(x: Float64Array, step: Float64Array, n: number, ratio: number): boolean {
  for (let i = 0; i < n; i++) {
    let largest = 0;
    let next = 0;
    for (let at = i * n; at < (i + 1) * n; at++) {
      largest = Math.max(largest, Math.abs(x[at]));
      next = Math.max(next, Math.abs(step[at]));
    }
    if (!(next * ratio <= SETTLED * largest)) return false;
  }
  return true;
}

/** Overwrites the defect by what it is once x has moved: the way is short, so that working precision serves. */
function moveDefect(a: Float64Array, defect: Float64Array, moved: Float64Array, n: number, sampled: boolean): void {
  const product = flatProduct(a, moved, n, n, n);
  const added = sampled ? flatProduct(product, flatTranspose(a, n, n), n, n, n) : product;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) defect[i * n + j] += added[i * n + j] + (sampled ? -moved[i * n + j] : added[j * n + i]);
  }
}

/** A X + X A' + Q (sampled: A X A' - X + Q) for symmetric wide X, summed in double-double and rounded once; symmetric. */
function lyapunovDefect(a: Split, x: Wide, q: Float64Array, n: number, sampled: boolean): Float64Array {
  const product = wideProduct(a, x, n, n, n);
  const first = sampled ? wideProduct(a, wideTranspose(product, n, n), n, n, n) : product;
  const defect = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const at = i * n + j;
      const across = j * n + i;
      const u = first.hi[at];
      const v = sampled ? -x.hi[at] : product.hi[across];
      const low = first.lo[at] + (sampled ? -x.lo[at] : product.lo[across]);
      const sum = u + v;
      const part = sum - u;
      const total = sum + q[at];
      const rest = total - sum;
      const lost = u - (sum - part) + (v - part) + (sum - (total - rest) + (q[at] - rest));
      defect[at] = defect[across] = total + (lost + low);
    }
  }
  return defect;
}

/**
 * Y with A Y + Y A' + C = 0 (sampled: A Y A' - Y + C = 0) from the Schur form of A, for symmetric C; symmetric to the bit.
 * Throws singular as `solveTriangularLyapunov` does.
 */
export function solveLyapunovBySchur({ t, qt }: FlatSchur, n: number, c: Float64Array, sampled: boolean): Float64Array {
  const q = flatTranspose(qt, n, n);
  const turned = flatProduct(qt, c, n, n, n);
  const inside = flatProduct(turned, q, n, n, n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) inside[i * n + j] = inside[j * n + i] = -0.5 * (inside[i * n + j] + inside[j * n + i]);
  }
  solveTriangularLyapunov(t, n, inside, sampled);
  flatProductInto(turned, q, inside, n, n, n);
  const y = flatProduct(turned, qt, n, n, n);
  for (let i = 0; i < n; i++) for (let j = 0; j < i; j++) y[i * n + j] = y[j * n + i] = 0.5 * (y[i * n + j] + y[j * n + i]);
  return y;
}
