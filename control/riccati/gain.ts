import { flatCholesky, solveCholesky } from "../linalg/cholesky";
import { addNarrow, addWide, split, type Wide, widen, wideProduct } from "../linalg/double-double";
import { flatNorm } from "../linalg/norms";
import { workCopy } from "../linalg/work-array";
import type { FlatProblem } from "./problem";
import type { GainSystem } from "./residual";

/** The gain with the Cholesky factor of its weight, and the size of the last correction: what is left of its error at most. */
export type Gain = { readonly k: Wide; readonly factor: Float64Array; readonly uncertainty: number };

const CORRECTIONS = 12;

/** R⁻¹ W in double; throws not-positive-definite, naming R, or R + B'XB when sampled. */
export function roughGain({ n, m, sampled }: FlatProblem, { weight, right }: GainSystem): Float64Array {
  return solveCholesky(flatCholesky(weight.hi, m, sampled ? "R + B'XB" : "R"), m, right.hi, n);
}

/**
 * K with (weight) K = right, corrected with double-double residuals until the next correction could not be seen below
 * `enough` of its size.
 *
 * Throws    not-positive-definite as `roughGain`
 * Accuracy  every entry of `hi` correctly rounded when enough is ε², unless entries of one row differ by fifteen digits
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, section 12 (iterative refinement)
 */
export function accurateGain(problem: FlatProblem, { weight, right }: GainSystem, enough: number): Gain {
  const { n, m, sampled } = problem;
  const factor = flatCholesky(weight.hi, m, sampled ? "R + B'XB" : "R");
  const k = widen(solveCholesky(factor, m, right.hi, n));
  const high = split(weight.hi);
  const low = sampled ? split(weight.lo) : null;
  let last = flatNorm(k.hi);
  let previous = last;
  for (let round = 0; round < CORRECTIONS; round++) {
    const rest = { hi: workCopy(right.hi), lo: workCopy(right.lo) };
    addWide(rest, wideProduct(high, k, m, m, n), -1);
    if (low) addWide(rest, wideProduct(low, k, m, m, n), -1);
    const step = solveCholesky(factor, m, rest.hi, n);
    const size = flatNorm(step);
    if (!(size < 0.5 * last)) return { k, factor, uncertainty: size };
    addNarrow(k, step, 1);
    previous = last;
    last = size;
    if (size * (size / previous) <= enough * flatNorm(k.hi)) break;
  }
  return { k, factor, uncertainty: last * Math.min(1, last / previous) };
}
