import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import type { Rows } from "./model";

/** Rows of a plant document as a matrix of the stated size; a matrix without rows or columns keeps its other size. */
export function toMatrix(name: string, rows: Rows, height: number, width: number): Matrix {
  if (rows.length !== height) {
    throw new NumericalError("shape-mismatch", {
      matrix: name,
      expected: [height, width],
      given: [rows.length, rows[0]?.length ?? 0],
    });
  }
  const M = new Matrix(height, width);
  rows.forEach((row, i) => {
    if (row.length !== width) {
      throw new NumericalError("shape-mismatch", {
        matrix: name,
        row: i,
        expected: [height, width],
        given: [height, row.length],
      });
    }
    row.forEach((entry, j) => {
      if (!Number.isFinite(entry)) throw new NumericalError("not-finite", { matrix: name, row: i, column: j });
      M.set(i, j, entry);
    });
  });
  return M;
}

export function toRows(M: Matrix): number[][] {
  return M.to2DArray();
}
