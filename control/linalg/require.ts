import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";

/** Throws not-finite with the first entry that is NaN or infinite. */
export function requireFinite(name: string, M: Matrix): void {
  for (let row = 0; row < M.rows; row++) {
    for (let column = 0; column < M.columns; column++) {
      if (!Number.isFinite(M.get(row, column))) throw new NumericalError("not-finite", { matrix: name, row, column });
    }
  }
}

/** Throws shape-mismatch unless M is rows×columns. */
export function requireShape(name: string, M: Matrix, rows: number, columns: number): void {
  if (M.rows !== rows || M.columns !== columns) {
    throw new NumericalError("shape-mismatch", { matrix: name, expected: [rows, columns], given: [M.rows, M.columns] });
  }
}

export function requireSquare(name: string, M: Matrix): void {
  requireShape(name, M, M.rows, M.rows);
}

/**
 * Throws not-symmetric with the first pair that differs by more than rounding of entries typed in decimal:
 * 8 ε times the larger of the pair and of the two diagonal entries' geometric mean.
 */
export function requireSymmetric(name: string, M: Matrix): void {
  requireSquare(name, M);
  for (let row = 0; row < M.rows; row++) {
    for (let column = 0; column < row; column++) {
      const a = M.get(row, column);
      const b = M.get(column, row);
      if (a === b) continue;
      const diagonal = Math.sqrt(Math.abs(M.get(row, row))) * Math.sqrt(Math.abs(M.get(column, column)));
      const size = Math.max(Math.abs(a), Math.abs(b), diagonal);
      if (Math.abs(a - b) > 8 * Number.EPSILON * size) throw new NumericalError("not-symmetric", { matrix: name, row, column });
    }
  }
}
