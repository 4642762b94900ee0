import { Matrix } from "ml-matrix";
import { addNarrow, addWide, split, widen, wideProduct } from "../linalg/double-double";
import { fromFlat, toFlat } from "../linalg/flat";

/**
 * What a rounded A - B K lacks: the exact difference minus `rounded`, so that both together hold twice the digits. A stiff or
 * lightly damped loop moves visibly within the rounding of its own matrix.
 *
 * Shapes    A n×k, B n×m, K m×k, rounded n×k → n×k; zero throughout where a product leaves the range of doubles
 */
export function lostInDifference(A: Matrix, B: Matrix, K: Matrix, rounded: Matrix): Matrix {
  const exact = widen(toFlat(A));
  addWide(exact, wideProduct(split(toFlat(B)), widen(toFlat(K)), B.rows, B.columns, K.columns), -1);
  addNarrow(exact, toFlat(rounded), -1);
  if (!exact.hi.every(Number.isFinite)) return Matrix.zeros(A.rows, A.columns);
  return fromFlat(exact.hi, A.rows, A.columns);
}
