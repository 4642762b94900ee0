import type { Matrix } from "ml-matrix";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { Complex } from "../plant/model";
import { type Placement, placePoles } from "../poles/place-poles";
import { inDual } from "./dual-refusal";

export type ObserverProblem = {
  readonly A: Matrix;
  readonly C: Matrix;
  readonly poles: readonly Complex[];
  readonly allowDefective?: boolean;
};

/** As for the regulator, with L in place of K; `gainNorm` and `conditioning` are those of L and of A - L C. */
export type PlacedObserver = Omit<Placement, "K"> & { readonly L: Matrix };

/**
 * Gain of the full-order observer xhat' = A xhat + B u + L (y - C xhat - D u) whose error A - L C has the wanted poles; when
 * sampled, of the one that makes xhat(k+1) from y(k).
 *
 * Shapes    A n×n, C p×n, n poles → L n×p
 * Units     poles in the plant's plane; L in state (per second) per output
 * Throws    as placePoles, with not-observable { pole, state, distance } for a mode that no output sees
 * Accuracy  that of placePoles on A', C'
 * Source    Luenberger, IEEE Trans. Military Electronics 8 (1964) 74-80; duality: Kalman 1960
 */
export function observerByPoles({ A, C, poles, allowDefective }: ObserverProblem): PlacedObserver {
  requireSquare("A", A);
  requireShape("C", C, C.rows, A.rows);
  requireFinite("A", A);
  requireFinite("C", C);
  const { K, ...placed } = inDual(() => placePoles({ A: A.transpose(), B: C.transpose(), poles, allowDefective }));
  return { ...placed, L: K.transpose() };
}
