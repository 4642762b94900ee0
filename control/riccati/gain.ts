import { flatCholesky, solveCholesky } from "../linalg/cholesky";
import { addNarrow, addWide, split, type Wide, widen, wideProduct } from "../linalg/double-double";
import { flatNorm } from "../linalg/norms";
import type { FlatProblem } from "./problem";
import type { GainSystem } from "./residual";

const CORRECTIONS = 8;

/** R⁻¹ W in double; throws not-positive-definite, naming R, or R + B'XB when sampled. */
export function roughGain({ n, m, sampled }: FlatProblem, { weight, right }: GainSystem): Float64Array {
  return solveCholesky(flatCholesky(weight.hi, m, sampled ? "R + B'XB" : "R"), m, right.hi, n);
}

/**
 * K with (weight) K = right, corrected with double-double residuals until it stands still: every entry correctly rounded
 * in `hi` unless entries of one row differ by more than fifteen digits.
 *
 * Throws    not-positive-definite as `roughGain`
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, section 12 (iterative refinement)
 */
export function accurateGain(problem: FlatProblem, { weight, right }: GainSystem): Wide {
  const { n, m, sampled } = problem;
  const l = flatCholesky(weight.hi, m, sampled ? "R + B'XB" : "R");
  const k = widen(solveCholesky(l, m, right.hi, n));
  const high = split(weight.hi);
  const low = split(weight.lo);
  let last = Number.POSITIVE_INFINITY;
  for (let round = 0; round < CORRECTIONS; round++) {
    const rest = { hi: right.hi.slice(), lo: right.lo.slice() };
    addWide(rest, wideProduct(high, k, m, m, n), -1);
    addWide(rest, wideProduct(low, k, m, m, n), -1);
    const step = solveCholesky(l, m, rest.hi, n);
    const size = flatNorm(step);
    if (!(size < 0.5 * last)) break;
    addNarrow(k, step, 1);
    last = size;
    if (size === 0) break;
  }
  return k;
}
