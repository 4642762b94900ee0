import { NumericalError } from "../errors";
import { addNarrow, type Wide, widen } from "../linalg/double-double";
import { flatIdentity } from "../linalg/flat";
import { workArray, workCopy } from "../linalg/work-array";
import { type Loop, solveInLoop, stableLoop } from "./closed-loop";
import { accurateGain, type Gain } from "./gain";
import { bestStepLength } from "./line-search";
import type { Start } from "./problem";
import {
  type Approximation,
  errorMajorant,
  isRounding,
  type SolutionError,
  solutionError,
  uniformMajorant,
} from "./refined-error";
import { type GainSystem, gainSystem, riccatiResidual, type SplitProblem } from "./residual";

export type Refined = {
  readonly x: Wide;
  readonly system: GainSystem;
  readonly gain: Gain;
  /** A - BK */
  readonly loop: Float64Array;
  /** Real Schur form of the transpose of the loop, or of one very near it. */
  readonly schurForm: Float64Array;
  /** Of the equation at x, in double. */
  readonly residual: Float64Array;
  readonly error: SolutionError;
  /** H of (A - BK)'H + H(A - BK) + I = 0 (sampled: its like): how far the loop amplifies a change of the equation. */
  readonly amplification: Float64Array;
};

const STEP_LIMIT = 60;
const SLOW_LIMIT = 25;
const SETTLE_LIMIT = 12;
const HALVINGS = 12;
const FREEZE_BELOW = 1e-7;
/** A fall of the steps that no closed loop on the boundary has. */
const CONTRACTING = 1e-3;
const SETTLE_ABOVE = 1e-6;
const SEARCH_ABOVE = 1e-2;
/** Relative error of the rows of X and K that shows in no double, even of an entry 1e-6 of its row. */
const ENOUGH = 1e-22;
const STANDSTILL_BELOW = 1e-12;
/** The gain that a step holds as data must be right to rounding: its error enters squared. */
const GAIN_DATA = 0.25 * Number.EPSILON;
const GAIN_RESULT = Number.EPSILON * Number.EPSILON;

/**
 * Newton's method on the Riccati equation with double-double residuals and Lyapunov solves in double.
 *
 * Shapes    units n: size of one caller's unit of each state, in which the rows of X and K are to be right
 * Throws    not-stabilising when the closed loop of a step has an eigenvalue on or outside the boundary; no-convergence
 *           when steps shrink only linearly (closed loop on the boundary) or 60 steps are not enough; singular
 * Accuracy  the error shrinks by the condition of the Lyapunov equation times ε per step, down to double-double rounding
 * Source    Kleinman, IEEE Trans. Autom. Control 13 (1968) 114-115; Hewer, ibid. 16 (1971) 382-384; step length: Benner &
 *           Byers, ibid. 43 (1998) 101-107; refinement with doubled residuals after Higham 2002, section 12
 */
export function refine(problem: SplitProblem, start: Start, units: Float64Array): Refined {
  const { n } = problem;
  const x = widen("x" in start ? start.x : workArray(n * n));
  let held: HeldLoop | null = null;
  let amplification: Float64Array | null = null;
  let last = Number.POSITIVE_INFINITY;
  let slow = 0;
  if ("gain" in start) {
    held = { k: start.gain, loop: stableLoop(problem, start.gain) };
    settle(problem, x, held);
  }
  for (let step = 1; step <= STEP_LIMIT; step++) {
    const system = gainSystem(problem, x);
    const gain = accurateGain(problem, system, GAIN_DATA);
    if (!held || last > FREEZE_BELOW) {
      held = loopTowards(problem, held, gain.k.hi);
      amplification = null;
      if (held.k !== gain.k.hi) {
        settle(problem, x, held);
        continue;
      }
    }
    const { loop } = held;
    const residual = riccatiResidual(problem, x, gain.k.hi, system);
    const now = { x, system, gain, loop: loop.matrix, schurForm: loop.schur.t, residual };
    const change = solveInLoop(problem, loop, residual);
    const size = relativeSize(change, x.hi, n);
    if (!Number.isFinite(size)) break;
    // A further step would do no better than the last: because rounding is reached, or because steps only halve.
    if (size <= STANDSTILL_BELOW && !(size < 0.25 * last) && isRounding(problem, now)) {
      amplification ??= solveInLoop(problem, loop, flatIdentity(n));
      const majorant = solveInLoop(problem, loop, errorMajorant(problem, now));
      const last = { ...now, gain: accurateGain(problem, system, GAIN_RESULT) };
      return { ...last, error: solutionError(problem, last, majorant, units), amplification };
    }
    if (last <= FREEZE_BELOW && size <= CONTRACTING * last) {
      // A correction leaves of the error what it left of the correction before it.
      amplification ??= solveInLoop(problem, loop, flatIdentity(n));
      const left = { ...now, residual: times(residual, (2 * size) / (last || 1)) };
      const error = solutionError(problem, left, uniformMajorant(problem, left, amplification), units);
      if (error.rows <= ENOUGH) return { ...corrected(problem, left, change), error, amplification };
    }
    advance(problem, x, now, change, size, { k: gain.k.hi, loop });
    // Many halving steps are the sign of a closed loop on the stability boundary: they prove nothing.
    if (size < SEARCH_ABOVE && size > 0.25 * last) slow += 1;
    if (slow > SLOW_LIMIT) break;
    last = size;
  }
  throw new NumericalError("no-convergence", { routine: "riccati-newton", limit: STEP_LIMIT });
}

function times(a: Float64Array, factor: number): Float64Array {
  const b = workArray(a.length);
  for (let i = 0; i < a.length; i++) b[i] = factor * a[i];
  return b;
}

/** The approximation with its last correction applied and the gain that goes with it. */
function corrected<T extends Approximation>(problem: SplitProblem, now: T, change: Float64Array): T & { system: GainSystem } {
  addNarrow(now.x, change, 1);
  const system = gainSystem(problem, now.x);
  return { ...now, system, gain: accurateGain(problem, system, GAIN_RESULT) };
}

type HeldLoop = { readonly loop: Loop; readonly k: Float64Array };

/** With the gain `to`, or as far from the last one towards it as the loop is stable in double: any part of the way lowers the cost. */
function loopTowards(problem: SplitProblem, from: HeldLoop | null, to: Float64Array): HeldLoop {
  let k = to;
  for (let halving = 0; ; halving++) {
    try {
      return { loop: stableLoop(problem, k), k };
    } catch (error) {
      if (!(error instanceof NumericalError) || !from || halving === HALVINGS) throw error;
      k = k.map((entry, at) => 0.5 * (from.k[at] + entry));
    }
  }
}

/** The Newton step: solved to double-double accuracy and lengthened or shortened while it is large. */
function advance(
  problem: SplitProblem,
  x: Wide,
  { gain, residual }: { gain: Gain; residual: Float64Array },
  change: Float64Array,
  size: number,
  held: HeldLoop,
): void {
  const before = workCopy(x.hi);
  addNarrow(x, change, 1);
  if (size <= SETTLE_ABOVE) return;
  settle(problem, x, held);
  if (size <= SEARCH_ABOVE || problem.sampled) return;
  const whole = x.hi.map((entry, at) => entry - before[at]);
  const length = bestStepLength(problem, gain.factor, residual, whole);
  addNarrow(
    x,
    whole.map((entry) => (length - 1) * entry),
    1,
  );
}

/** X of the loop with its gain held fixed, as far as repeated correction brings it. */
function settle(problem: SplitProblem, x: Wide, { k, loop }: HeldLoop): void {
  let last = Number.POSITIVE_INFINITY;
  for (let round = 0; round < SETTLE_LIMIT; round++) {
    const change = solveInLoop(problem, loop, riccatiResidual(problem, x, k, gainSystem(problem, x)));
    const size = relativeSize(change, x.hi, problem.n);
    if (!(size < 0.5 * last)) return;
    addNarrow(x, change, 1);
    if (size <= FREEZE_BELOW * FREEZE_BELOW) return;
    last = size;
  }
}

/** Largest |change of x_ij| / √(x_ii x_jj), x before or after, whichever is larger: the same in any units of the states. */
function relativeSize(change: Float64Array, x: Float64Array, n: number): number {
  const diagonal = Float64Array.from({ length: n }, (_, i) => Math.abs(x[i * n + i]) + Math.abs(change[i * n + i]));
  const floor = diagonal.reduce((largest, entry) => Math.max(largest, entry), 0) * FREEZE_BELOW * Number.EPSILON;
  if (floor === 0) return change.every((entry) => entry === 0) ? 0 : Number.POSITIVE_INFINITY;
  const roots = diagonal.map((entry) => Math.sqrt(entry + floor));
  let size = 0;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j <= i; j++) {
      const part = Math.abs(change[i * n + j]) / roots[i] / roots[j];
      if (!(part <= size)) size = part;
    }
  }
  return size;
}
