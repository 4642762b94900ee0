import { Matrix } from "ml-matrix";
import { solveLinear } from "../linalg/solve-linear";
import { solveLyapunov } from "../linalg/solve-lyapunov";

export type SlopeProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  /** The optimal gain of A, B and the weights, and the solution of its Riccati equation. */
  readonly K: Matrix;
  readonly P: Matrix;
  readonly inputWeight: Matrix;
  readonly stateChange: Matrix;
  readonly inputChange: Matrix;
  readonly sampled: boolean;
};

/**
 * How the optimal gain moves with its weights: K changes by t times the result, to first order, when Q changes by t times
 * `stateChange` and R by t times `inputChange`.
 *
 * Shapes    A n×n, B n×m, K m×n, P and stateChange n×n symmetric, inputWeight and inputChange m×m symmetric → m×n
 * Units     those of K
 * Throws    as `solveLyapunov` of the closed loop; singular
 * Accuracy  that of the Lyapunov solution; the result is a derivative, so a change as large as the weight itself is only sketched
 * Source    the Riccati equation differentiated: with Ac = A - BK, Ac'dP + dP Ac + dQ + K'dR K = 0 and R dK = B'dP - dR K
 *           (sampled: Ac'dP Ac - dP + dQ + K'dR K = 0 and (R + B'PB) dK = B'dP Ac - dR K)
 */
export function gainSlope({ A, B, K, P, inputWeight, stateChange, inputChange, sampled }: SlopeProblem): Matrix {
  const closed = Matrix.sub(A, B.mmul(K));
  const felt = inputChange.mmul(K);
  const Q = symmetric(Matrix.add(stateChange, K.transpose().mmul(felt)));
  const dP = solveLyapunov({ A: closed.transpose(), Q, timeBase: sampled ? "sampled" : "continuous" }).X;
  const seen = B.transpose().mmul(dP);
  if (!sampled) return solveLinear(inputWeight, Matrix.sub(seen, felt)).X;
  const curvature = Matrix.add(inputWeight, B.transpose().mmul(P).mmul(B));
  return solveLinear(curvature, Matrix.sub(seen.mmul(closed), felt)).X;
}

/** Rounding leaves a product of a symmetric matrix from both sides symmetric only nearly. */
function symmetric(M: Matrix): Matrix {
  return Matrix.add(M, M.transpose()).mul(0.5);
}
