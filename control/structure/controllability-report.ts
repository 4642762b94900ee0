import type { Matrix } from "ml-matrix";
import { eigenvalues } from "../linalg/eigenvalues";
import { toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { RankReport } from "../plant/report";
import { analyseReach } from "./reach-analysis";

/**
 * Rank of the reachable part, with the tolerance it was decided at, and the direction that is hardest to reach.
 *
 * Shapes    A n×n, B n×m → singular values of one stage of the staircase, direction n (weights of the states)
 * Units     scale the pair first; the weakest value is relative to the norm of [A - λ I, B]
 * Throws    shape-mismatch; not-finite; no-convergence
 * Accuracy  verdicts hold for a pair within 4 (n + m) ε of the given one
 * Source    Paige, IEEE Trans. Automatic Control 26 (1981) 130-138
 */
export function controllabilityReport(A: Matrix, B: Matrix): RankReport {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  return analyseReach(toFlat(A), toFlat(B), A.rows, B.columns, eigenvalues(A)).report;
}

/**
 * The same for what outputs see: the controllability of the dual pair (A', C').
 *
 * Shapes    A n×n, C p×n → as `controllabilityReport`; the direction is a vector of states that the outputs see least
 * Units     as `controllabilityReport`
 * Throws    shape-mismatch; not-finite; no-convergence
 * Accuracy  as `controllabilityReport` of the dual pair
 * Source    Kalman, Contributions to the Theory of Optimal Control, 1960, for the duality
 */
export function observabilityReport(A: Matrix, C: Matrix): RankReport {
  requireShape("C", C, C.rows, A.rows);
  return controllabilityReport(A.transpose(), C.transpose());
}
