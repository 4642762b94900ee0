import { split, type Wide, wideProduct } from "../linalg/double-double";

/**
 * Product of two matrices of wide numbers.
 *
 * Shapes    x rows×inner, y inner×columns → rows×columns
 * Accuracy  a few inner·ε² of |x||y|
 * Source    Ogita, Rump & Oishi, SIAM J. Sci. Comput. 26 (2005) 1955-1988, algorithm 5.3
 */
export function wideByWide(x: Wide, y: Wide, rows: number, inner: number, columns: number): Wide {
  const product = wideProduct(split(x.hi), y, rows, inner, columns);
  for (let i = 0; i < rows; i++) {
    for (let l = 0; l < inner; l++) {
      const low = x.lo[i * inner + l];
      if (low === 0) continue;
      for (let j = 0; j < columns; j++) product.lo[i * columns + j] += low * y.hi[l * columns + j];
    }
  }
  return product;
}
