import { Matrix } from "ml-matrix";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import { gainAtPoint, type Loop } from "./closed-loop-gain";
import { scaledInverse } from "./scaled-inverse";

export type ReferenceProblem = Loop & { readonly sampled?: boolean };

export type ReferenceGain = {
  /** m×q, u = -K x + F r */
  readonly F: Matrix;
  /** Final value of z per unit of each r, q×q. */
  readonly steadyState: Matrix;
  /** Per commanded quantity: comes to rest at its own set point and stays at zero for every other. */
  readonly reached: readonly boolean[];
  /**
   * Why not: more commanded quantities than inputs; a zero of the plant at rest; or quantities (or inputs) that depend on each
   * other at every frequency.
   */
  readonly obstacle: null | "too-few-inputs" | "zero-at-rest" | "rank";
};

/** Relative accuracy, beyond the rounding that was traced, at which a quantity counts as reached. */
const REACHED = Math.sqrt(Number.EPSILON);

/**
 * Feed-through from set points to inputs that brings z = H x + J u to r at rest, as far as the plant allows; else the
 * least-squares compromise in units that make the gain from inputs to z even.
 *
 * Shapes    A n×n, B n×m, H q×n, J q×m, K m×n → F m×q
 * Units     F in input per commanded quantity
 * Throws    shape-mismatch; not-finite; singular when A - B K has a mode at rest, which a stable loop has not; too-large
 * Accuracy  ranks are decided against rounding traced entry by entry through the solution, so units do not matter
 * Source    static gain of the closed loop; least squares after Golub & Van Loan, Matrix Computations, 4th ed. 2013, 5.5
 */
export function referenceGain({ A, B, H, J, K, sampled = false }: ReferenceProblem): ReferenceGain {
  const n = A.rows;
  const m = B.columns;
  const q = H.rows;
  requireSquare("A", A);
  requireShape("B", B, n, m);
  requireShape("H", H, q, n);
  requireShape("J", J, q, m);
  requireShape("K", K, m, n);
  for (const [name, M] of [
    ["A", A],
    ["B", B],
    ["H", H],
    ["J", J],
    ["K", K],
  ] as const)
    requireFinite(name, M);
  if (q === 0) return { F: Matrix.zeros(m, 0), steadyState: Matrix.zeros(0, 0), reached: [], obstacle: null };
  const loop = { A, B, H, J, K };
  const { gain, rounding } = gainAtPoint(loop, sampled ? 1 : 0);
  const { X: F, rowScale } = scaledInverse({ gain, rounding });
  const steadyState = gain.mmul(F);
  requireRepresentable("reference gain", [...F.to1DArray(), ...steadyState.to1DArray()]);
  const reached = Array.from({ length: q }, (_, i) =>
    steadyState.getRow(i).every((value, j) => Math.abs(value - (i === j ? 1 : 0)) * (rowScale[i] / rowScale[j]) <= REACHED),
  );
  return { F, steadyState, reached, obstacle: reached.every(Boolean) ? null : obstacleOf(loop, sampled) };
}

/** A quantity lost at rest alone is a zero there; one lost at other points too never had an input of its own. */
function obstacleOf(loop: Loop, sampled: boolean): "too-few-inputs" | "zero-at-rest" | "rank" {
  const q = loop.H.rows;
  if (q > loop.B.columns) return "too-few-inputs";
  const fastest = Math.max(...eigenvalues(Matrix.sub(loop.A, loop.B.mmul(loop.K))).map(modulus)) || 1;
  const points = sampled ? [2, 3.5] : [0.7 * fastest, 1.9 * fastest];
  return points.some((point) => scaledInverse(gainAtPoint(loop, point)).rank === q) ? "zero-at-rest" : "rank";
}
