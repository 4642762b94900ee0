import { NumericalError } from "../errors";
import { flatEigenvalues } from "../linalg/eigenvalues";
import { flatTranspose, flatTransposedProduct, fromFlat, largestEntry } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { exponentOf, timesPowerOfTwo } from "../linalg/power-of-two";
import { workArray, workCopy } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import { boundaryMargin } from "./check-modes";
import { closedLoop } from "./closed-loop";
import { conditionNumber } from "./condition-number";
import type { Gain } from "./gain";
import type { FlatProblem } from "./problem";
import { requireProvenStability } from "./proven-stability";
import type { Refined } from "./refine";
import type { ScaledProblem } from "./scale-problem";
import type { RiccatiMethod, RiccatiSolution } from "./solution";

import { unseenStates } from "./unseen-states";

/** A gain that may be off by more than this has no digit worth showing. */
const LARGEST_ERROR = 0.1;

const POWER_ROUNDS = 6;

/**
 * The refined solution in the given units, once it has passed: finite, stabilising, residual within rounding.
 *
 * Throws    too-large; on-stability-boundary; inaccurate
 */
export function verifiedSolution(
  original: FlatProblem,
  scaled: ScaledProblem,
  refined: Refined,
  method: RiccatiMethod,
): RiccatiSolution {
  const { n, m } = original;
  const { state, input, cost, time } = scaled;
  const { gain } = refined;
  const d = Array.from(state, exponentOf);
  const e = Array.from(input, exponentOf);
  const x = rescaled(refined.x.hi, n, (i, j) => cost - time - d[i] - d[j]);
  const k = rescaled(gain.k.hi, n, (i, j) => e[i] - d[j]);
  for (const unseen of unseenStates(original)) {
    for (let i = 0; i < n; i++) x[unseen * n + i] = x[i * n + unseen] = 0;
    for (let i = 0; i < m; i++) k[i * n + unseen] = 0;
  }
  if (!(Number.isFinite(largestEntry(x)) && Number.isFinite(largestEntry(k))))
    throw new NumericalError("too-large", { what: "solution", limit: Number.MAX_VALUE });
  const { residual, bound } = relativeResidual(scaled.problem, refined);
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
  const closedLoopPoles = polesOf(scaled, gain.k.hi);
  const stabilityDistance = Math.min(...closedLoopPoles.map((pole) => boundaryMargin(pole, original.sampled)));
  if (!(stabilityDistance > 0)) throw new NumericalError("on-stability-boundary", { distance: stabilityDistance });
  requireProvenStability(scaled.problem, refined);
  const K = fromFlat(k, m, n);
  const errorBound = gainErrorBound(scaled, refined, gain, k, growthOf(k, m, n));
  if (!(errorBound <= LARGEST_ERROR)) throw new NumericalError("inaccurate", { residual: errorBound, bound: LARGEST_ERROR });
  return {
    X: fromFlat(x, n, n),
    K,
    residual,
    bound,
    condition: conditionNumber(scaled.problem, refined),
    errorBound,
    closedLoopPoles,
    stabilityDistance,
    method,
  };
}

/** Poles of the loop with the rounded gain: scaling by powers of two moves them by the unit of time alone. */
function polesOf({ problem, time }: ScaledProblem, k: Float64Array): Complex[] {
  const loop = closedLoop(problem, k);
  if (!Number.isFinite(largestEntry(loop))) throw new NumericalError("no-convergence", { routine: "riccati-newton", limit: 1 });
  const poles = flatEigenvalues(loop, problem.n);
  if (time === 0) return poles;
  const moved = poles.map(({ re, im }) => ({ re: timesPowerOfTwo(re, time), im: timesPowerOfTwo(im, time) }));
  if (!moved.every(({ re, im }) => Number.isFinite(re) && Number.isFinite(im)))
    throw new NumericalError("too-large", { what: "eigenvalue", limit: Number.MAX_VALUE });
  return moved;
}

function rescaled(from: Float64Array, columns: number, exponent: (i: number, j: number) => number): Float64Array {
  const to = workArray(from.length);
  for (let at = 0, i = 0; at < from.length; i++) {
    for (let j = 0; j < columns; j++, at++) if (from[at] !== 0) to[at] = timesPowerOfTwo(from[at], exponent(i, j));
  }
  return to;
}

/** |Kv| / |v| for v from rounds with K'K: never above the 2-norm, and ordinarily within a few percent of it. */
function growthOf(k: Float64Array, m: number, n: number): number {
  const whole = flatNorm(k);
  if (whole === 0) return 0;
  const v = workArray(n);
  const next = workArray(n);
  for (let i = 0; i < m; i++) for (let j = 0; j < n; j++) if (Math.abs(k[i * n + j]) > Math.abs(v[j])) v[j] = k[i * n + j];
  let growth = 0;
  for (let round = 0; round < POWER_ROUNDS; round++) {
    const size = flatNorm(v);
    if (size === 0) break;
    next.fill(0);
    let square = 0;
    for (let i = 0; i < m; i++) {
      let image = 0;
      for (let j = 0; j < n; j++) image += (k[i * n + j] / whole) * (v[j] / size);
      square += image * image;
      for (let j = 0; j < n; j++) next[j] += (k[i * n + j] / whole) * image;
    }
    growth = Math.max(growth, whole * Math.sqrt(square));
    v.set(next);
  }
  return Math.max(growth, whole / Math.sqrt(Math.min(m, n)));
}

/** Residual at the rounded X over the size of the equation's terms (Frobenius norms), against 2 n ε. */
function relativeResidual({ n, m, a, b, q, sampled }: FlatProblem, refined: Refined): { residual: number; bound: number } {
  const { x, loop, gain } = refined;
  // What rounding took from X passes through the linear part of the equation.
  const passed = flatTransposedProduct(loop, x.lo, n, n, n);
  const left = workCopy(refined.residual);
  const second = sampled ? flatTransposedProduct(loop, flatTranspose(passed, n, n), n, n, n) : null;
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) {
      const at = i * n + j;
      left[at] -= second ? second[at] - x.lo[at] : passed[at] + passed[j * n + i];
    }
  }
  const sizeA = flatNorm(a) + flatNorm(b) * flatNorm(gain.k.hi);
  const size = (sampled ? 1 + sizeA * sizeA : 2 * sizeA) * flatNorm(x.hi) + flatNorm(q);
  return { residual: size === 0 ? 0 : flatNorm(left) / size, bound: 2 * (n + m) * Number.EPSILON };
}

/** First-order bound on the error of K before rounding, and half a unit in the last place of each entry. */
function gainErrorBound(scaled: ScaledProblem, refined: Refined, gain: Gain, k: Float64Array, size: number): number {
  if (size === 0) return 0;
  const { input, right } = refined.error;
  const passed = input.map((entry, i) => entry * scaled.input[i]);
  const unscaled = right.map((entry, j) => entry / scaled.state[j]);
  const uncertain = gain.uncertainty / (flatNorm(gain.k.hi) || 1);
  return (flatNorm(passed) * flatNorm(unscaled) + (0.5 * Number.EPSILON + uncertain) * flatNorm(k)) / size;
}
