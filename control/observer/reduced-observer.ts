import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import type { Complex } from "../plant/model";
import { describeFixedMode, keepFixedModes } from "../poles/fixed-modes";
import { type Placement, type PlacementProblem, placePoles } from "../poles/place-poles";
import { groupPoles } from "../poles/wanted-poles";
import { outputCoordinates } from "./output-coordinates";

export type ReducedProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D?: Matrix;
  readonly poles: readonly Complex[];
  readonly allowDefective?: boolean;
};

export type ReducedObserver = {
  /** n - rank C */
  readonly order: number;
  readonly Fw: Matrix;
  readonly Fy: Matrix;
  readonly Fu: Matrix;
  readonly Gw: Matrix;
  readonly Gy: Matrix;
  /** Eigenvalues of Fw, in the order of the wanted poles. */
  readonly achieved: readonly Complex[];
  readonly poleError: number;
  readonly residual: number;
  readonly bound: number;
  readonly method: string;
};

/**
 * Observer of order n - rank C, which estimates only what the outputs do not show at once:
 * w' = Fw w + Fy y + Fu u (sampled: w(k+1)), xhat = Gw w + Gy (y - D u). No derivative of y is needed.
 * With x = T₁ξ₁ + T₂ξ₂ and ξ₁ read from y, w = ξ₂hat - L ξ₁ and Fw = A₂₂ - L A₁₂.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m (zero when absent), n - rank C poles → Fw r×r, Fy r×p, Fu r×m, Gw n×r, Gy n×p
 * Units     those of the plant; w has the units of mixed states
 * Throws    shape-mismatch; not-finite; pole-count; poles-not-conjugate; pole-multiplicity; not-observable
 *           { pole, state, distance } for a mode that no output sees; inaccurate; no-convergence; too-large
 * Accuracy  that of placePoles on A₂₂', A₁₂'; outputs that repeat others are averaged
 * Source    Luenberger, IEEE Trans. Autom. Control 16 (1971) 596-602; Gopinath 1971
 */
export function reducedObserver({ A, B, C, D, poles, allowDefective }: ReducedProblem): ReducedObserver {
  const through = D ?? Matrix.zeros(C.rows, B.columns);
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireShape("C", C, C.rows, A.rows);
  requireShape("D", through, C.rows, B.columns);
  for (const [name, M] of [
    ["A", A],
    ["B", B],
    ["C", C],
    ["D", through],
  ] as const)
    requireFinite(name, M);
  const { rank, Seen, Hidden, SeenRows, Rest, Read } = outputCoordinates(A, C);
  const order = A.rows - rank;
  if (poles.length !== order) throw new NumericalError("pole-count", { expected: order, given: poles.length });
  if (order === 0) return readDirectly(representable("observer", Seen.mmul(Read)), B.columns);
  const A12 = representable("plant", SeenRows.mmul(A).mmul(Hidden));
  const A22 = representable("plant", Rest.mmul(A).mmul(Hidden));
  const placed = placeHidden(A, C, { A: A22.transpose(), B: A12.transpose(), poles, allowDefective });
  const L = placed.K.transpose();
  const Fw = Matrix.sub(A22, L.mmul(A12));
  const rows = Matrix.sub(Rest, L.mmul(SeenRows));
  const back = Matrix.add(Seen, Hidden.mmul(L));
  const Gy = back.mmul(Read);
  const Fy = rows.mmul(A).mmul(Gy);
  const Fu = Matrix.sub(rows.mmul(B), Fy.mmul(through));
  for (const M of [Fw, Fy, Fu, Hidden, Gy]) representable("observer", M);
  const { achieved, poleError, residual, bound, method } = placed;
  return { order, Fw, Fy, Fu, Gw: Hidden, Gy, achieved, poleError, residual, bound, method };
}

function representable(what: string, M: Matrix): Matrix {
  requireRepresentable(what, M.to1DArray());
  return M;
}

/** Gain for the part the outputs do not show; a mode that stays hidden is named in the states of the whole plant. */
function placeHidden(A: Matrix, C: Matrix, hidden: PlacementProblem): Placement {
  try {
    return placePoles(hidden);
  } catch (error) {
    if (!(error instanceof NumericalError)) throw error;
    const pole = error.code === "not-controllable" ? (error.data.pole as Complex) : unseenMode(A, C, hidden.poles);
    if (!pole) throw error;
    throw new NumericalError("not-observable", describeFixedMode(A.transpose(), C.transpose(), pole));
  }
}

/** A mode that no output sees and no wanted pole stands for: rounding in the hidden part alone may have covered it. */
function unseenMode(A: Matrix, C: Matrix, poles: readonly Complex[]): Complex | undefined {
  try {
    keepFixedModes(A.transpose(), C.transpose(), groupPoles(poles, poles.length));
    return undefined;
  } catch (error) {
    if (error instanceof NumericalError && error.code === "not-controllable") return error.data.pole as Complex;
    throw error;
  }
}

/** The outputs show every state at once: nothing is left to estimate. */
function readDirectly(Gy: Matrix, inputs: number): ReducedObserver {
  return {
    order: 0,
    Fw: Matrix.zeros(0, 0),
    Fy: Matrix.zeros(0, Gy.columns),
    Fu: Matrix.zeros(0, inputs),
    Gw: Matrix.zeros(Gy.rows, 0),
    Gy,
    achieved: [],
    poleError: 0,
    residual: 0,
    bound: 0,
    method: "states read from the outputs",
  };
}
