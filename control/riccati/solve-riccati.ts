import { NumericalError } from "../errors";
import { flatCholesky } from "../linalg/cholesky";
import { widen } from "../linalg/double-double";
import { eigenvalues } from "../linalg/eigenvalues";
import { flatProduct, flatTransposedProduct, fromFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { workScope } from "../linalg/work-array";
import { checkReach, checkSight, leastReachable } from "./check-modes";
import { checkProblem, type RiccatiProblem } from "./check-problem";
import { roughGain } from "./gain";
import type { FlatProblem, Start } from "./problem";
import { refine } from "./refine";
import { removeCrossTerm } from "./remove-cross-term";
import { gainSystem, splitProblem } from "./residual";
import { scaleProblem } from "./scale-problem";
import type { RiccatiMethod, RiccatiSolution } from "./solution";
import { startByDoubling } from "./start-by-doubling";
import { startByGain } from "./start-by-gain";
import { hamiltonianMatrix, startBySchur } from "./start-by-schur";
import { verifiedSolution } from "./verified-solution";
import { wellInSight, wellWithinReach } from "./well-within-reach";

export type { RiccatiProblem } from "./check-problem";
export type { RiccatiMethod, RiccatiSolution } from "./solution";

/** Once every start has failed, a mode this near to being unreachable is named as the cause. */
const NEARLY_UNREACHABLE = 1e-6;
/** Beyond this ratio of scaled entries no start keeps a digit of what the small ones do: the refusal speaks of the ratio. */
const WIDEST_SPREAD = 1e60;
const GAIN_SHIFTS = [0.3, 3, 0.03];

/**
 * Stabilising solution of A'X + XA - (XB + S) R⁻¹ (B'X + S') + Q = 0 and K = R⁻¹ (B'X + S'); sampled:
 * A'XA - X - (A'XB + S)(R + B'XB)⁻¹(B'XA + S') + Q = 0 and K = (R + B'XB)⁻¹(B'XA + S').
 *
 * Shapes    A n×n, B n×m, Q n×n, R m×m, S n×m (zero when absent) → X n×n, K m×n
 * Units     u = -K x minimises x'Qx + 2 x'Su + u'Ru
 * Throws    shape-mismatch; not-finite; too-large (also "spread": entries further apart than any digits); not-symmetric;
 *           not-positive-definite (R; sampled: R + B'XB);
 *           not-positive-semidefinite ([Q S; S' R]; with allowIndefinite only when no
 *           stabilising solution is found); not-stabilizable; unweighted-boundary-mode; on-stability-boundary;
 *           no-convergence; inaccurate. Never returns a gain that does not stabilise
 * Accuracy  ordinarily every entry of X and K correctly rounded; errorBound says when not. Each start is refined until
 *           contraction and the residual prove the digits; at most five starts of sixty steps
 * Source    doubling: Chu, Fan & Lin 2005; Schur method: Laub 1979; stabilising gain: Varga 1981; Newton: Kleinman 1968,
 *           Hewer 1971, with residuals in double-double and the step length of Benner & Byers 1998; scaling: Benner 2001
 */
export function solveRiccati(given: RiccatiProblem): RiccatiSolution {
  return workScope(() => solve(given));
}

function solve(given: RiccatiProblem): RiccatiSolution {
  const { problem: original, indefinite, definite } = checkProblem(given);
  const scaled = scaleProblem(original, scalingWeight);
  const problem = splitProblem(scaled.problem);
  const units = unitsOf(scaled.state);
  const reasons: NumericalError[] = [];
  for (const { method, start } of starts(problem)) {
    const found = attempt(() => {
      const refined = refine(problem, start(), units);
      return { refined, solution: verifiedSolution(original, scaled, refined, method) };
    });
    if (found instanceof NumericalError) {
      reasons.push(found);
      continue;
    }
    if (!wellWithinReach(problem, found.refined)) checkReach(original);
    if (!definite && !wellInSight(problem, found.refined)) checkSight(original);
    return found.solution;
  }
  checkReach(original);
  checkSight(original);
  throw indefinite ?? refusal(original, scaled.problem, reasons);
}

function attempt<T>(work: () => T): T | NumericalError {
  try {
    return work();
  } catch (error) {
    if (error instanceof NumericalError) return error;
    throw error;
  }
}

/** Size of one unit of the caller's in each scaled state, the largest put to one. */
function unitsOf(state: Float64Array): Float64Array {
  const least = state.reduce((size, entry) => Math.min(size, entry), Number.POSITIVE_INFINITY);
  return state.map((entry) => least / entry);
}

/** The starts in order of cost. */
function starts(problem: FlatProblem): { method: RiccatiMethod; start: () => Start }[] {
  const { plain, auxiliary } = startable(problem);
  // An auxiliary R moves the solution but not the stabilising property: only its gain is handed on.
  const begin = (x: Float64Array): Start => (auxiliary ? { gain: gainOf(plain, x) } : { x });
  return [
    { method: "doubling", start: () => begin(startByDoubling(removeCrossTerm(plain, "R"))) },
    { method: "ordered-schur", start: () => begin(startBySchur(removeCrossTerm(plain, "R"))) },
    ...GAIN_SHIFTS.map((shift) => ({
      method: "stabilising-gain" as const,
      start: () => ({ gain: startByGain(problem, shift) }),
    })),
  ];
}

/** The problem itself, or one with more input weight where a sampled problem has a singular R. */
function startable(problem: FlatProblem): { plain: FlatProblem; auxiliary: boolean } {
  const { n, m, b, q, r } = problem;
  if (!problem.sampled || isPositiveDefinite(r, m)) return { plain: problem, auxiliary: false };
  const weighed = flatNorm(flatTransposedProduct(b, flatProduct(q, b, n, n, m), n, m, m));
  const more = 0.015625 * Math.max(weighed, flatNorm(r)) || 1;
  return { plain: { ...problem, r: r.map((entry, at) => (at % (m + 1) === 0 ? entry + more : entry)) }, auxiliary: true };
}

function isPositiveDefinite(r: Float64Array, m: number): boolean {
  try {
    flatCholesky(r, m, "R");
    return true;
  } catch (error) {
    if (error instanceof NumericalError) return false;
    throw error;
  }
}

function gainOf(problem: FlatProblem, x: Float64Array): Float64Array {
  return roughGain(problem, gainSystem(splitProblem(problem), widen(x)));
}

/** B R⁻¹ B' for the choice of scales, from the auxiliary problem where R is singular. */
function scalingWeight(problem: FlatProblem): Float64Array {
  return removeCrossTerm(startable(problem).plain, "R").g;
}

/** Why no start ended in a verified solution, as near as can be told. */
function refusal(original: FlatProblem, problem: FlatProblem, reasons: readonly NumericalError[]): NumericalError {
  const singularWeight = startable(problem).auxiliary ? reasons.find(({ code }) => code === "not-positive-definite") : undefined;
  if (singularWeight) return singularWeight;
  const given = spread(problem);
  if (given > WIDEST_SPREAD) return new NumericalError("too-large", { what: "spread", limit: WIDEST_SPREAD, given });
  const nearest = leastReachable(original, NEARLY_UNREACHABLE);
  if (nearest && nearest.distance < NEARLY_UNREACHABLE) return new NumericalError("not-stabilizable", nearest);
  const distance = axisDistance(problem);
  if (distance !== null) return new NumericalError("on-stability-boundary", { distance });
  const failed = reasons.find(({ code }) => code === "too-large" || code === "inaccurate");
  return failed ?? new NumericalError("no-convergence", { routine: "solve-riccati", limit: 2 + GAIN_SHIFTS.length });
}

/** Of the largest to the smallest entry that is not zero, in scaled coordinates. */
function spread({ a, b, q, r, s }: FlatProblem): number {
  let largest = 0;
  let smallest = Number.POSITIVE_INFINITY;
  for (const part of [a, b, q, r, s]) {
    for (let i = 0; i < part.length; i++) {
      const size = Math.abs(part[i]);
      if (size > largest) largest = size;
      if (size > 0 && size < smallest) smallest = size;
    }
  }
  return largest === 0 ? 1 : Math.min(largest / smallest, Number.MAX_VALUE);
}

/** Least real part in size among the Hamiltonian eigenvalues where it is within √ε of zero, else null. */
function axisDistance(problem: FlatProblem): number | null {
  try {
    const h = hamiltonianMatrix(removeCrossTerm(startable(problem).plain, "R"));
    const size = 2 * problem.n;
    const distance = Math.min(...eigenvalues(fromFlat(h, size, size)).map(({ re }) => Math.abs(re)));
    return distance <= 10 * Math.sqrt(Number.EPSILON) * flatNorm(h) ? distance : null;
  } catch (error) {
    if (error instanceof NumericalError) return null;
    throw error;
  }
}
