import { NumericalError } from "../errors";
import { flatCholesky, solveCholesky } from "../linalg/cholesky";
import { addNarrow, split, type Wide, widen, wideProduct } from "../linalg/double-double";
import { eigenvalues } from "../linalg/eigenvalues";
import { flatProduct, flatTranspose, fromFlat } from "../linalg/flat";
import { flatNorm, twoNorm } from "../linalg/norms";
import { exponentOf, timesPowerOfTwo } from "../linalg/power-of-two";
import { boundaryMargin } from "./check-modes";
import { accurateGain } from "./gain";
import type { FlatProblem } from "./problem";
import type { Refined } from "./refine";
import { gainSystem, riccatiResidual, splitProblem } from "./residual";
import type { ScaledProblem } from "./scale-problem";
import type { RiccatiMethod, RiccatiSolution } from "./solution";

/** A gain that may be off by more than this has no digit worth showing. */
const LARGEST_ERROR = 0.1;

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
  const gain = accurateGain(scaled.problem, refined.system);
  const x = new Float64Array(n * n);
  const d = Array.from(state, exponentOf);
  const e = Array.from(input, exponentOf);
  for (let i = 0; i < n; i++)
    for (let j = 0; j < n; j++) x[i * n + j] = timesPowerOfTwo(refined.x.hi[i * n + j], cost - time - d[i] - d[j]);
  const k = new Float64Array(m * n);
  for (let i = 0; i < m; i++) for (let j = 0; j < n; j++) k[i * n + j] = timesPowerOfTwo(gain.hi[i * n + j], e[i] - d[j]);
  if (![...x, ...k].every(Number.isFinite)) throw new NumericalError("too-large", { what: "solution", limit: Number.MAX_VALUE });
  const { residual, bound } = relativeResidual(scaled.problem, refined.x.hi, gain.hi);
  if (!(residual <= bound)) throw new NumericalError("inaccurate", { residual, bound });
  const closedLoopPoles = eigenvalues(fromFlat(closedLoop(original, k), n, n));
  const stabilityDistance = Math.min(...closedLoopPoles.map((pole) => boundaryMargin(pole, original.sampled)));
  if (!(stabilityDistance > 0)) throw new NumericalError("on-stability-boundary", { distance: stabilityDistance });
  const K = fromFlat(k, m, n);
  const errorBound = gainErrorBound(scaled, refined, gain, k, twoNorm(K));
  if (!(errorBound <= LARGEST_ERROR)) throw new NumericalError("inaccurate", { residual: errorBound, bound: LARGEST_ERROR });
  return {
    X: fromFlat(x, n, n),
    K,
    residual,
    bound,
    errorBound,
    closedLoopPoles,
    stabilityDistance,
    method,
  };
}

/** A - BK with the products summed in double-double, then rounded. */
function closedLoop({ n, m, a, b }: FlatProblem, k: Float64Array): Float64Array {
  const product = wideProduct(split(b.map((x) => -x)), widen(k), n, m, n);
  addNarrow(product, a, 1);
  return product.hi;
}

/** Residual at the rounded X over the size of the equation's terms (Frobenius norms), against 2 n ε. */
function relativeResidual(given: FlatProblem, x: Float64Array, k: Float64Array): { residual: number; bound: number } {
  const { n, m, a, b, q, sampled } = given;
  const problem = splitProblem(given);
  const wide = widen(x);
  const left = flatNorm(riccatiResidual(problem, wide, k, gainSystem(problem, wide)));
  const sizeA = flatNorm(a) + flatNorm(flatProduct(b, k, n, m, n));
  const size = (sampled ? 1 + sizeA * sizeA : 2 * sizeA) * flatNorm(x) + flatNorm(q);
  return { residual: size === 0 ? 0 : left / size, bound: 2 * n * Number.EPSILON };
}

/** First-order bound: error of X through R⁻¹B', entry by entry, plus half a unit in the last place of each entry of K. */
function gainErrorBound(scaled: ScaledProblem, refined: Refined, gain: Wide, k: Float64Array, size: number): number {
  const { n, m, b, sampled } = scaled.problem;
  if (size === 0) return 0;
  const l = flatCholesky(refined.system.weight.hi, m, "R");
  const through = solveCholesky(l, m, flatTranspose(b, n, m), n);
  const left = flatProduct(through.map(Math.abs), refined.error, m, n, 1);
  const right = sampled ? flatProduct(refined.error, closedLoop(scaled.problem, gain.hi).map(Math.abs), 1, n, n) : refined.error;
  const passed = left.map((entry, i) => entry * scaled.input[i]);
  const unscaled = right.map((entry, j) => entry / scaled.state[j]);
  return (flatNorm(passed) * flatNorm(unscaled) + 0.5 * Number.EPSILON * flatNorm(k)) / size;
}
