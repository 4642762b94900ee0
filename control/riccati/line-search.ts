import { solveCholesky } from "../linalg/cholesky";
import { flatTransposedProduct } from "../linalg/flat";
import type { FlatProblem } from "./problem";

const BISECTIONS = 40;

/**
 * Length t of the Newton step N that makes the residual of the continuous equation least: it is (1 - t) E - t² V with the
 * residual E before the step and V = N B R⁻¹ B' N. For 0 ≤ t ≤ 2 the loop stays stable.
 *
 * Shapes    factor m×m: Cholesky factor of R; residual, step n×n symmetric
 * Accuracy  t to 2⁻³⁹: how near it comes to the least is of no consequence
 * Source    Benner & Byers, An exact line search method for solving generalized continuous-time algebraic Riccati
 *           equations, IEEE Trans. Autom. Control 43 (1998) 101-107
 */
export function bestStepLength(
  { n, m, b }: FlatProblem,
  factor: Float64Array,
  residual: Float64Array,
  step: Float64Array,
): number {
  const right = flatTransposedProduct(b, step, n, m, n);
  const v = flatTransposedProduct(right, solveCholesky(factor, m, right, n), m, n, n);
  let [alpha, beta, gamma] = [0, 0, 0];
  for (let i = 0; i < v.length; i++) {
    alpha += residual[i] * residual[i];
    beta += residual[i] * v[i];
    gamma += v[i] * v[i];
  }
  const slope = (t: number): number => -2 * alpha * (1 - t) - 2 * beta * t * (2 - 3 * t) + 4 * gamma * t * t * t;
  // The full step where the sums have left the doubles, too.
  if (!(slope(0) < 0 && slope(2) > 0 && Number.isFinite(slope(2)))) return 1;
  let [low, high] = [0, 2];
  for (let round = 0; round < BISECTIONS; round++) {
    const middle = 0.5 * (low + high);
    if (slope(middle) < 0) low = middle;
    else high = middle;
  }
  return low > 0.0009765625 ? low : 1;
}
