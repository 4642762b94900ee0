import { Matrix } from "ml-matrix";
import { requireRepresentable } from "../linalg/require-representable";
import { solveLinear } from "../linalg/solve-linear";

/** A loop u = -K x + v about z = H x + J u. */
export type Loop = { readonly A: Matrix; readonly B: Matrix; readonly H: Matrix; readonly J: Matrix; readonly K: Matrix };

/** Entries of `gain` below their `rounding` are exactly zero. */
export type GainAtPoint = { readonly gain: Matrix; readonly rounding: Matrix };

/** Roundings counted per term. */
const SLACK = 4;

/**
 * Gain from v to z of the closed loop at a real point s (or z, sampled), with a bound on the rounding of every entry.
 *
 * Shapes    A n×n, B n×m, H q×n, J q×m, K m×n → q×m
 * Units     z per input, each entry and its bound in units of its own
 * Throws    singular when the point is a pole of the loop; too-large
 * Accuracy  |error| ≤ rounding, entry by entry, to first order
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, theorem 7.4
 */
export function gainAtPoint({ A, B, H, J, K }: Loop, point: number): GainAtPoint {
  const n = A.rows;
  const M = Matrix.sub(Matrix.eye(n).mul(point), Matrix.sub(A, B.mmul(K)));
  requireRepresentable("closed loop", M.to1DArray());
  const inverse = solveLinear(M, Matrix.eye(n)).X;
  const X = solveLinear(M, B).X;
  const seen = Matrix.sub(H, J.mmul(K));
  const gain = Matrix.add(seen.mmul(X), J);
  const sizeX = absolute(X);
  const sizeM = Matrix.add(Matrix.eye(n).mul(Math.abs(point)), Matrix.add(absolute(A), absolute(B).mmul(absolute(K))));
  const sizeSeen = Matrix.add(absolute(H), absolute(J).mmul(absolute(K)));
  const solving = absolute(inverse).mmul(Matrix.add(sizeM.mmul(sizeX), absolute(B)));
  const rounding = Matrix.add(sizeSeen.mmul(Matrix.add(solving, sizeX)), absolute(J)).mul(
    SLACK * (n + B.columns) * Number.EPSILON,
  );
  requireRepresentable("gain at rest", [...gain.to1DArray(), ...rounding.to1DArray()]);
  for (let i = 0; i < gain.rows; i++) {
    for (let j = 0; j < gain.columns; j++) if (Math.abs(gain.get(i, j)) <= rounding.get(i, j)) gain.set(i, j, 0);
  }
  return { gain, rounding };
}

function absolute(M: Matrix): Matrix {
  return Matrix.abs(M);
}
