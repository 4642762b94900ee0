import { factorShiftedHessenberg, shiftedHessenbergRoom, solveShiftedHessenberg } from "../linalg/complex-hessenberg";
import { flatEigenvalues } from "../linalg/eigenvalues";
import { flatNorm } from "../linalg/norms";
import { workArray } from "../linalg/work-array";
import { boundaryMargin } from "./check-modes";
import type { FlatProblem } from "./problem";
import type { Refined } from "./refine";

/** Distances beyond this multiple of n ε are told apart from zero in any coordinates of an ordinary plant. */
const CLEAR = 1e6;
/** The like for a distance taken at the mode itself. */
const CLEAR_AT_MODE = 1e5;
const PROBES = 4;

/**
 * Whether the solution itself proves that no mode on or outside the boundary is near to being out of reach: then these modes
 * need no test of their own. A left vector w with w'(A - λ) = e₁ and w'B = e₂ gives w'(A - BK - λ) = e₁ - e₂K, which is no
 * shorter than the distance of the loop from instability; and that is at least 1 / (2 |H|), sampled 1 / (3 |H|). Where this
 * does not suffice, the distance of A - BK - λ from a singular matrix is estimated at each mode.
 *
 * Source    Lyapunov bound: Hinrichsen & Pritchard, Systems Control Lett. 7 (1986) 1-10 (from memory)
 */
export function wellWithinReach(problem: FlatProblem, refined: Refined): boolean {
  const { n, a, b } = problem;
  const plant = flatNorm(a) + flatNorm(b);
  const needed = n * Number.EPSILON * plant * (1 + flatNorm(refined.gain.k.hi));
  if (loopDistance(problem, refined) > CLEAR * needed) return true;
  const room = shiftedHessenbergRoom(n);
  const slack = Math.sqrt(Number.EPSILON) * (problem.sampled ? 1 : plant);
  return flatEigenvalues(a, n).every((pole) => {
    if (pole.im < 0 || boundaryMargin(pole, problem.sampled) > slack) return true;
    factorShiftedHessenberg(refined.schurForm, n, pole, room);
    return room.zeroPivot < 0 && CLEAR_AT_MODE * needed * inverseSize(room, n) < 1;
  });
}

/** Estimate of |(sI - T)⁻¹| from four solutions: each probe has length √n and sees, on average, 1/n of the largest growth squared. */
function inverseSize(room: ReturnType<typeof shiftedHessenbergRoom>, n: number): number {
  const re = workArray(n * PROBES);
  const im = workArray(n * PROBES);
  for (let at = 0; at < re.length; at++) re[at] = signOf(Math.floor(at / PROBES), at % PROBES);
  solveShiftedHessenberg(room, re, im, PROBES);
  return Math.sqrt(n) * (flatNorm(re) + flatNorm(im));
}

/** Four patterns of signs without a common period. */
function signOf(i: number, pattern: number): number {
  return ((i * (2 * pattern + 3)) % 7) + ((i * (pattern + 2)) % 5) < 5 ? 1 : -1;
}

/**
 * Whether the solution proves that the weights see every mode on the boundary: a right vector v with (A - λ)v = e₁ and weight
 * e₂ has |R^½ K v|² ≤ e₂ + 2 |e₁| |X| by the equation, while BKv moves λ as far as the loop is from instability.
 */
export function wellInSight(problem: FlatProblem, refined: Refined): boolean {
  const { n, m, a, b, r, q } = problem;
  let least = Number.POSITIVE_INFINITY;
  for (let j = 0; j < m; j++) least = Math.min(least, r[j * m + j]);
  const sizeB = flatNorm(b);
  const proven = loopDistance(problem, refined);
  // A loop that rounding alone keeps off the boundary proves nothing.
  if (!(proven > CLEAR * n * Number.EPSILON * (flatNorm(a) + sizeB * flatNorm(refined.gain.k.hi)))) return false;
  const moved = proven / sizeB;
  const seen = flatNorm(q) + 2 * (flatNorm(a) + sizeB) * flatNorm(refined.x.hi);
  return least * moved * moved > CLEAR * n * Number.EPSILON * seen;
}

/** The loop is at least this far from having an eigenvalue on or outside the boundary. */
export function loopDistance({ sampled }: FlatProblem, { amplification }: Refined): number {
  return 1 / ((sampled ? 3 : 2) * flatNorm(amplification));
}
