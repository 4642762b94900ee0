import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { eigenvalues } from "../linalg/eigenvalues";
import { largestEntry, pythagoras, toFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { Complex } from "../plant/model";
import { bandPair } from "./banded-pair";
import { bracketDistance } from "./distance-bracket";
import { smallestSingular } from "./smallest-singular";

/** The distance lies between `lower` and `upper`; `at` is where [A - s I, B] comes nearest to losing rank, im ≥ 0. */
export type DistanceBracket = {
  readonly lower: number;
  readonly upper: number;
  readonly at: Complex;
  /** Smallest singular values computed; the search stops at its limit with what is proven by then. */
  readonly evaluations: number;
};

const TIGHTNESS = 0.01;
/** Evaluations allowed: what a few seconds do, many for few states. */
const mostEvaluations = (n: number) => Math.max(4000, Math.min(40_000, Math.floor(1.5e6 / (n * n))));

/**
 * Size of the smallest change of A and B, real or complex, that leaves some mode out of reach: the least over all complex s
 * of the smallest singular value of [A - s I, B]. Zero for a pair that is not controllable.
 *
 * Shapes    A n×n, B n×m; `evaluations` bounds the work, 4000 to 40000 by size unless given
 * Units     as A and B, whose units count: scale the pair first
 * Throws    shape-mismatch; not-finite; no-convergence; too-large
 * Accuracy  upper is attained at `at`; lower ≥ 0.99 upper unless the work ran out; both within n ε of the norm of [A B], below
 *           which lower is zero; n² m + 60 n² complex flops for each evaluation
 * Source    Eising, Systems & Control Letters 4 (1984) 263-264; Gu, SIAM J. Matrix Anal. Appl. 21 (2000) 989-1003 (from memory)
 */
export function distanceToUncontrollability(A: Matrix, B: Matrix, evaluations = mostEvaluations(A.rows)): DistanceBracket {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  const [n, m] = [A.rows, B.columns];
  const [a, b] = [toFlat(A), toFlat(B)];
  const scale = powerOfTwo(-exponentOf(Math.max(largestEntry(a), largestEntry(b)) || 1));
  const poles = eigenvalues(A).filter(({ im }) => im >= 0);
  for (const x of [a, b]) for (let i = 0; i < x.length; i++) x[i] *= scale;
  const starts = poles.map(({ re, im }) => ({ re: re * scale, im: im * scale }));
  const size = flatNorm(a);
  const norm = pythagoras(size, flatNorm(b));
  if (norm === 0) return { lower: 0, upper: 0, at: { re: 0, im: 0 }, evaluations: 0 };
  const floor = 4 * (n + m) * Number.EPSILON * norm;
  // A pole p has σ(p) ≤ |B|, and σ(s) ≥ |s| - |A| grows beyond that; wider than A alone asks for, so that squares keep digits.
  const radius = 2 * powerOfTwo(exponentOf(Math.max(2 * size, norm) || 1));
  const sigma = smallestSingular(bandPair(a, b, n, m));
  const { at, ...found } = bracketDistance(sigma, [...starts, ...between(starts)], radius, {
    tightness: TIGHTNESS,
    floor,
    most: evaluations,
  });
  const largest = Math.max(found.upper, Math.abs(at.re), Math.abs(at.im)) / scale;
  if (!Number.isFinite(largest)) throw new NumericalError("too-large", { what: "distance", limit: Number.MAX_VALUE });
  return {
    lower: found.lower / scale,
    upper: found.upper / scale,
    at: { re: at.re / scale, im: at.im / scale },
    evaluations: found.evaluations,
  };
}

/**
 * The same for what outputs see: the size of the smallest change of A and C that hides some mode.
 *
 * Shapes    A n×n, C p×n
 * Units     as A and C
 * Throws    as `distanceToUncontrollability`
 * Accuracy  as `distanceToUncontrollability`
 * Source    Kalman, Contributions to the Theory of Optimal Control, 1960, for the duality
 */
export function distanceToUnobservability(A: Matrix, C: Matrix, evaluations = mostEvaluations(A.rows)): DistanceBracket {
  requireShape("C", C, C.rows, A.rows);
  return distanceToUncontrollability(A.transpose(), C.transpose(), evaluations);
}

/** Midpoints of neighbours in the order of the poles. */
function between(poles: readonly Complex[]): Complex[] {
  return poles.slice(1).map(({ re, im }, k) => ({ re: (re + poles[k].re) / 2, im: (im + poles[k].im) / 2 }));
}
