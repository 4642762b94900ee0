import type { Matrix } from "ml-matrix";
import type { Complex } from "../plant/model";

export type RiccatiSolution = {
  readonly X: Matrix;
  readonly K: Matrix;
  /** Of the equation at the returned X, relative to its terms, in scaled coordinates; never above `bound`. */
  readonly residual: number;
  readonly bound: number;
  /** By how much a relative change of the problem can grow in X, to first order, in scaled coordinates. */
  readonly condition: number;
  /** Bound on the relative error of K in the 2-norm. */
  readonly errorBound: number;
  /** Eigenvalues of A - BK with the returned K. */
  readonly closedLoopPoles: Complex[];
  /** Least distance of a closed-loop pole from the stability boundary: -Re s, or 1 - |z|. */
  readonly stabilityDistance: number;
  /** Which start led to the answer; all end in the same Newton refinement. */
  readonly method: RiccatiMethod;
};

export type RiccatiMethod = "doubling" | "ordered-schur" | "stabilising-gain";
