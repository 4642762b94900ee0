import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { solveLinear } from "../linalg/solve-linear";
import type { TimeBase } from "../plant/model";

/**
 * Gain from constant inputs to z = H x + J u at rest: J - H A⁻¹ B, or J + H (I - A)⁻¹ B when sampled.
 *
 * Shapes    A n×n, B n×m, H q×n, J q×m → q×m
 * Units     those of z over those of u
 * Throws    shape-mismatch; not-finite; singular when the plant has a mode at rest (an integrator); too-large
 * Accuracy  about n ε over the reciprocal condition of A (of I - A)
 */
export function gainAtRest(A: Matrix, B: Matrix, H: Matrix, J: Matrix, timeBase: TimeBase): Matrix {
  const atRest = timeBase.kind === "continuous" ? Matrix.mul(A, -1) : Matrix.sub(Matrix.eye(A.rows), A);
  const gain = Matrix.add(J, H.mmul(solveLinear(atRest, B).X));
  if (!gain.to1DArray().every(Number.isFinite))
    throw new NumericalError("too-large", { what: "gain at rest", limit: Number.MAX_VALUE });
  return gain;
}
