import { Matrix } from "ml-matrix";
import { toFlat } from "../linalg/flat";
import { orthonormalBasis } from "../linalg/orthogonal";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { solveLinear } from "../linalg/solve-linear";
import { evenStateUnits } from "../poles/state-units";

/** x = Seen ξ₁ + Hidden ξ₂, with ξ₁ = Read (y - D u) known from the outputs and ξ₂ = Rest x to be estimated. */
export type OutputCoordinates = {
  readonly rank: number;
  readonly Seen: Matrix;
  readonly Hidden: Matrix;
  /** Rows of the inverse of [Seen Hidden]. */
  readonly SeenRows: Matrix;
  readonly Rest: Matrix;
  readonly Read: Matrix;
};

/**
 * Coordinates that part what the outputs show at once from what they do not, orthonormal in balanced units.
 *
 * Shapes    A n×n, C p×n → Seen n×r, Hidden n×(n - r), SeenRows r×n, Rest (n - r)×n, Read r×p, r = rank C
 * Units     as the plant; balanced by powers of two inside
 * Throws    not-finite; no-convergence
 * Accuracy  c n ε in balanced units; outputs that repeat others are averaged in the least-squares sense
 * Source    Gopinath, Bell System Technical Journal 50 (1971) 1063-1081, with orthogonal coordinates
 */
export function outputCoordinates(A: Matrix, C: Matrix): OutputCoordinates {
  const n = A.rows;
  const p = C.rows;
  // Units of the dual plant A', C' are the reciprocals of the states' own.
  const stateScale = evenStateUnits(toFlat(A.transpose()), toFlat(C.transpose()), n, p).map((unit) => 1 / unit);
  const Cs = C.clone();
  for (let i = 0; i < n; i++) Cs.mulColumn(i, stateScale[i]);
  const output = Array.from({ length: p }, (_, k) => reciprocalPower(Cs.getRow(k)));
  for (let k = 0; k < p; k++) Cs.mulRow(k, output[k]);
  const { range, complement, rank } = orthonormalBasis(Cs.transpose());
  const Read = leastSquaresInverse(Cs.mmul(range));
  for (let k = 0; k < p; k++) Read.mulColumn(k, output[k]);
  const SeenRows = range.transpose();
  const Rest = complement.transpose();
  for (let i = 0; i < n; i++) {
    if (rank > 0) {
      SeenRows.mulColumn(i, 1 / stateScale[i]);
      range.mulRow(i, stateScale[i]);
    }
    if (rank < n) {
      Rest.mulColumn(i, 1 / stateScale[i]);
      complement.mulRow(i, stateScale[i]);
    }
  }
  return { rank, Seen: range, Hidden: complement, SeenRows, Rest, Read };
}

/** (M'M)⁻¹M' of a tall M with full rank, by an orthonormal basis of its columns. */
function leastSquaresInverse(M: Matrix): Matrix {
  if (M.columns === 0) return Matrix.zeros(0, M.rows);
  if (M.rows === M.columns) return solveLinear(M, Matrix.eye(M.rows)).X;
  const { range } = orthonormalBasis(M, 0);
  const rows = range.transpose();
  return solveLinear(rows.mmul(M), rows).X;
}

function reciprocalPower(row: readonly number[]): number {
  const largest = Math.max(0, ...row.map(Math.abs));
  return largest === 0 ? 1 : powerOfTwo(-exponentOf(largest));
}
