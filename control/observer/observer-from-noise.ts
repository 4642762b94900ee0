import type { Matrix } from "ml-matrix";
import { cholesky } from "../linalg/cholesky";
import { requireFinite, requireShape, requireSquare, requireSymmetric } from "../linalg/require";
import type { Complex } from "../plant/model";
import { solveRiccati } from "../riccati/solve-riccati";
import { inDual } from "./dual-refusal";

export type NoiseProblem = {
  readonly A: Matrix;
  readonly C: Matrix;
  readonly processNoise: Matrix;
  readonly measurementNoise: Matrix;
  readonly sampled?: boolean;
};

export type NoiseObserver = {
  readonly L: Matrix;
  /** Of the estimation error: at rest, and when sampled of xhat(k) before y(k) is known. */
  readonly covariance: Matrix;
  readonly achieved: readonly Complex[];
  readonly residual: number;
  readonly bound: number;
  /** Bound on the relative error of L, 2-norm. */
  readonly errorBound: number;
  /** Of the covariance, as `solveRiccati` states it for the dual problem. */
  readonly condition: number;
  /** Least distance of an eigenvalue of A - LC from the stability boundary. */
  readonly stabilityDistance: number;
  readonly method: string;
};

/**
 * Gain of the observer with the least error covariance at rest: the steady Kalman filter, by the Riccati equation of the dual
 * plant. Sampled: the predictor, which makes xhat(k+1) from y(k).
 *
 * Shapes    A n×n, C p×n, processNoise n×n positive semidefinite, measurementNoise p×p positive definite → L n×p
 * Units     continuous: spectral densities; sampled: variances per sample
 * Throws    shape-mismatch; not-finite; not-symmetric; not-positive-semidefinite and not-positive-definite, whose `matrix` is
 *           "process noise" or "measurement noise"; not-detectable { pole, state, distance }; unweighted-boundary-mode for a
 *           mode on the stability boundary that the process noise does not drive; on-stability-boundary; no-convergence; inaccurate
 * Accuracy  that of solveRiccati: ordinarily every entry correctly rounded
 * Source    Kalman & Bucy 1961; Kalman 1960
 */
export function observerFromNoise({ A, C, processNoise, measurementNoise, sampled = false }: NoiseProblem): NoiseObserver {
  const n = A.rows;
  requireSquare("A", A);
  requireShape("C", C, C.rows, n);
  requireShape("process noise", processNoise, n, n);
  requireShape("measurement noise", measurementNoise, C.rows, C.rows);
  requireFinite("A", A);
  requireFinite("C", C);
  requireFinite("process noise", processNoise);
  requireSymmetric("process noise", processNoise);
  cholesky(measurementNoise, "measurement noise");
  const solved = inDual(() =>
    solveRiccati({ A: A.transpose(), B: C.transpose(), Q: processNoise, R: measurementNoise, sampled }),
  );
  const { X, K, closedLoopPoles: achieved, residual, bound, errorBound, condition, stabilityDistance, method } = solved;
  return { L: K.transpose(), covariance: X, achieved, residual, bound, errorBound, condition, stabilityDistance, method };
}
