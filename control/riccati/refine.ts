import { NumericalError } from "../errors";
import { addNarrow, type Wide, widen } from "../linalg/double-double";
import { flatProduct, flatTranspose } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { type FlatSchur, flatSchur } from "../linalg/real-schur";
import { schurValues } from "../linalg/schur-values";
import { solveLyapunovBySchur } from "../linalg/solve-lyapunov";
import { roughGain } from "./gain";
import type { Start } from "./problem";
import { type GainSystem, gainSystem, riccatiResidual, type SplitProblem } from "./residual";
import { diagonalMajorant, residualSizes } from "./residual-sizes";

export type Refined = {
  readonly x: Wide;
  readonly system: GainSystem;
  readonly steps: number;
  /** Entry (i, j) of x, before rounding, is off by at most error[i] error[j], to first order; in scaled coordinates. */
  readonly error: Float64Array;
};

const STEP_LIMIT = 60;
const FREEZE_BELOW = 1e-7;
/** Nothing below this shows in a double, even of an entry 1e-9 of the largest. */
const ENOUGH = 1e-28;
const STANDSTILL_BELOW = 1e-14;

/**
 * Newton's method on the Riccati equation with double-double residuals and Lyapunov solves in double.
 *
 * Throws    not-stabilising when the closed loop of a step has an eigenvalue on or outside the boundary; no-convergence
 *           when steps shrink only linearly (closed loop on the boundary) or 60 steps are not enough; singular
 * Accuracy  the error shrinks by the condition of the Lyapunov equation times ε per step, down to double-double rounding
 * Source    Kleinman, IEEE Trans. Autom. Control 13 (1968) 114-115; Hewer, ibid. 16 (1971) 382-384; refinement with
 *           doubled residuals after Higham 2002, section 12
 */
export function refine(problem: SplitProblem, start: Start): Refined {
  const { n } = problem;
  const x = widen("x" in start ? start.x : new Float64Array(n * n));
  let given = "gain" in start ? start.gain : null;
  let schur: FlatSchur | null = null;
  let last = Number.POSITIVE_INFINITY;
  let slow = 0;
  for (let step = 1; step <= STEP_LIMIT; step++) {
    const system = gainSystem(problem, x);
    const k = given ?? roughGain(problem, system);
    if (!schur || last > FREEZE_BELOW) schur = stableLoop(problem, k);
    let size = correct(problem, x, k, system, schur);
    // From a gain alone X is far off: its value for that gain is settled before the next one is taken.
    if (given) for (let inner = 0; inner < 3; inner++) correct(problem, x, k, gainSystem(problem, x), schur);
    if (given) size = 1;
    given = null;
    if (!Number.isFinite(size)) break;
    if (size <= ENOUGH || (size <= STANDSTILL_BELOW && size > 0.1 * last)) return finish(problem, x, schur, step);
    // Halving steps are the sign of a closed loop on the stability boundary: they prove nothing.
    if (size < 1e-2 && size > 0.1 * last) slow += 1;
    if (slow > 4) break;
    last = size;
  }
  throw new NumericalError("no-convergence", { routine: "riccati-newton", limit: STEP_LIMIT });
}

/** One Lyapunov correction of x at the fixed gain k; returns its size relative to x. */
function correct(problem: SplitProblem, x: Wide, k: Float64Array, system: GainSystem, schur: FlatSchur): number {
  const residual = riccatiResidual(problem, x, k, system);
  const step = solveLyapunovBySchur(schur, problem.n, residual, problem.sampled);
  addNarrow(x, step, 1);
  const change = flatNorm(step);
  const size = flatNorm(x.hi);
  return change === 0 ? 0 : change / size;
}

/** Schur form of (A - BK)', the matrix of the Lyapunov equation. */
function stableLoop(problem: SplitProblem, k: Float64Array): FlatSchur {
  const { n, m, a, b, sampled } = problem;
  const pulled = flatProduct(b, k, n, m, n);
  const loop = a.map((entry, i) => entry - pulled[i]);
  if (!loop.every(Number.isFinite)) throw new NumericalError("no-convergence", { routine: "riccati-newton", limit: STEP_LIMIT });
  const schur = flatSchur(flatTranspose(loop, n, n), n);
  for (const pole of schurValues(schur.t, n)) {
    const inside = sampled ? pole.re * pole.re + pole.im * pole.im < 1 : pole.re < 0;
    if (!inside) throw new NumericalError("not-stabilising", { pole });
  }
  return schur;
}

function finish(problem: SplitProblem, x: Wide, schur: FlatSchur, steps: number): Refined {
  const { n, sampled } = problem;
  const system = gainSystem(problem, x);
  const k = roughGain(problem, system);
  const sizes = residualSizes(problem, x.hi, k, riccatiResidual(problem, x, k, system));
  const y = solveLyapunovBySchur(schur, n, diagonalMajorant(sizes, n), sampled);
  return { x, system, steps, error: Float64Array.from({ length: n }, (_, i) => Math.sqrt(Math.abs(y[i * n + i]))) };
}
