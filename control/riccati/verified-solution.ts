import { NumericalError } from "../errors";
import { eigenvalues } from "../linalg/eigenvalues";
import { flatTransposedProduct, fromFlat } from "../linalg/flat";
import { flatNorm, twoNorm } from "../linalg/norms";
import { exponentOf, timesPowerOfTwo } from "../linalg/power-of-two";
import { boundaryMargin } from "./check-modes";
import { closedLoop } from "./closed-loop";
import { conditionNumber } from "./condition-number";
import { accurateGain, type Gain } from "./gain";
import type { FlatProblem } from "./problem";
import type { Refined } from "./refine";
import type { ScaledProblem } from "./scale-problem";
import type { RiccatiMethod, RiccatiSolution } from "./solution";

/** A gain that may be off by more than this has no digit worth showing. */
const LARGEST_ERROR = 0.1;

const GAIN_RESULT = Number.EPSILON * Number.EPSILON;
/** Above this many inputs a lower bound of the 2-norm of K serves the error bound, instead of its singular values. */
const FEW_INPUTS = 12;

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
  const gain = accurateGain(scaled.problem, refined.system, GAIN_RESULT);
  const d = Array.from(state, exponentOf);
  const e = Array.from(input, exponentOf);
  const x = rescaled(refined.x.hi, n, (i, j) => cost - time - d[i] - d[j]);
  const k = rescaled(gain.k.hi, n, (i, j) => e[i] - d[j]);
  if (!(x.every(Number.isFinite) && k.every(Number.isFinite)))
    throw new NumericalError("too-large", { what: "solution", limit: Number.MAX_VALUE });
  const { residual, bound } = relativeResidual(scaled.problem, refined);
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
  const closedLoopPoles = eigenvalues(fromFlat(closedLoop(original, k), n, n));
  const stabilityDistance = Math.min(...closedLoopPoles.map((pole) => boundaryMargin(pole, original.sampled)));
  if (!(stabilityDistance > 0)) throw new NumericalError("on-stability-boundary", { distance: stabilityDistance });
  const K = fromFlat(k, m, n);
  const size = m <= FEW_INPUTS ? twoNorm(K) : flatNorm(k) / Math.sqrt(Math.min(m, n));
  const errorBound = gainErrorBound(scaled, refined, gain, k, size);
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

function rescaled(from: Float64Array, columns: number, exponent: (i: number, j: number) => number): Float64Array {
  return from.map((entry, at) => (entry === 0 ? 0 : timesPowerOfTwo(entry, exponent(Math.floor(at / columns), at % columns))));
}

/** Residual at the rounded X over the size of the equation's terms (Frobenius norms), against 2 n ε. */
function relativeResidual({ n, m, a, b, q, sampled }: FlatProblem, refined: Refined): { residual: number; bound: number } {
  const { x, loop, gain } = refined;
  // What rounding took from X passes through the linear part of the equation.
  const passed = flatTransposedProduct(loop, x.lo, n, n, n);
  const left = refined.residual.slice();
  const second = sampled ? flatTransposedProduct(loop, transposed(passed, n), n, n, n) : null;
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

function transposed(a: Float64Array, n: number): Float64Array {
  return Float64Array.from(a, (_, at) => a[(at % n) * n + Math.floor(at / n)]);
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
