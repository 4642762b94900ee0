import { flatProduct, flatTransposedProduct } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { FlatProblem } from "./problem";
import type { Refined } from "./refine";

/**
 * By how much a relative change of A, G = B R⁻¹ B' and Q can grow in X, to first order, in scaled coordinates:
 * |H| (|Q| + 2 |A| |X| + |G| |X|²) / |X| with H the solution for the unit residual (sampled: with the loop's own terms).
 *
 * Accuracy  Frobenius norms: an estimate from above, rarely by more than n
 * Source    Kenney & Hewer, SIAM J. Control Optim. 28 (1990) 50-69; Byers, Numerical solution of the algebraic Riccati
 *           equation's condition, Linear Algebra Appl. 71 (1985) 35-45
 */
export function conditionNumber({ n, m, a, b, q, sampled }: FlatProblem, refined: Refined): number {
  const { x, gain, amplification, loop } = refined;
  const size = flatNorm(x.hi);
  if (size === 0) return 1;
  // K'WK in its two forms stands for the quadratic term, so that no inverse of R is needed.
  const quadratic = flatNorm(flatTransposedProduct(gain.k.hi, refined.system.right.hi, m, n, n));
  const plant = sampled
    ? 2 * flatNorm(a) * flatNorm(flatProduct(x.hi, loop, n, n, n))
    : 2 * flatNorm(a) * size + flatNorm(b) * flatNorm(gain.k.hi) * size;
  return (flatNorm(amplification) * (flatNorm(q) + plant + quadratic)) / size;
}
