import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { requireFinite, requireShape } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import { solveLinear } from "../linalg/solve-linear";
import type { System } from "../plant/scale-plant";

/**
 * S = (I + L)⁻¹ at the cut of a loop; T = I - S and every loop's own sensitivity are read from it.
 *
 * Shapes    L square k×k → the same
 * Throws    shape-mismatch; not-finite; too-large; singular { matrix: "I + D" } when the loop has no solution at once
 * Accuracy  c ε of |A| + |B (I + D)⁻¹ C|
 */
export function closedSensitivity({ A, B, C, D }: System): System {
  const k = D.rows;
  requireShape("D", D, k, k);
  requireShape("B", B, A.rows, k);
  requireShape("C", C, k, A.rows);
  for (const [name, M] of Object.entries({ A, B, C, D })) requireFinite(name, M);
  const undone = inverse(Matrix.add(Matrix.eye(k), D), "I + D");
  const fed = undone.mmul(C);
  const closed = { A: Matrix.sub(A, B.mmul(fed)), B: B.mmul(undone), C: Matrix.mul(fed, -1), D: undone };
  for (const M of Object.values(closed)) requireRepresentable("closed loop", M.to1DArray());
  return closed;
}

/** M⁻¹; throws singular with that name. The identity comes out exactly. */
export function inverse(M: Matrix, name: string): Matrix {
  try {
    return M.rows === 0 ? M : solveLinear(M, Matrix.eye(M.rows)).X;
  } catch (error) {
    if (error instanceof NumericalError && error.code === "singular") throw new NumericalError("singular", { matrix: name });
    throw error;
  }
}

/** T = I - S. */
export function complementary({ A, B, C, D }: System): System {
  return { A, B, C: Matrix.mul(C, -1), D: Matrix.sub(Matrix.eye(D.rows), D) };
}

/** S with `share` of the identity taken off. */
export function shifted({ A, B, C, D }: System, share: number): System {
  return { A, B, C, D: Matrix.sub(D, Matrix.mul(Matrix.eye(D.rows), share)) };
}

/** One loop's own sensitivity, all others closed. */
export function channelOf({ A, B, C, D }: System, channel: number): System {
  return {
    A,
    B: B.getColumnVector(channel),
    C: C.getRowVector(channel),
    D: new Matrix([[D.get(channel, channel)]]),
  };
}
