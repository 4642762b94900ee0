import { addNarrow, addWide, split, widen, wideProduct } from "../linalg/double-double";
import { workArray } from "../linalg/work-array";

/**
 * What a rounded A - B K lacks: the exact difference minus `rounded`, so that both together hold twice the digits. A stiff or
 * lightly damped loop moves visibly within the rounding of its own matrix.
 *
 * Shapes    a and rounded rows×columns, b rows×inner, k inner×columns → rows×columns; zero throughout where a product leaves the
 *           range of doubles
 */
export function lostInDifference(
  a: Float64Array,
  b: Float64Array,
  k: Float64Array,
  rounded: Float64Array,
  { rows, inner, columns }: { readonly rows: number; readonly inner: number; readonly columns: number },
): Float64Array {
  const exact = widen(a);
  addWide(exact, wideProduct(split(b), widen(k), rows, inner, columns), -1);
  addNarrow(exact, rounded, -1);
  return exact.hi.every(Number.isFinite) ? exact.hi : workArray(rows * columns);
}
