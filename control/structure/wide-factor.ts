import type { Wide } from "../linalg/double-double";
import { type WideNumber, wideDifference, wideQuotient, wideRoot, wideTimes } from "../linalg/wide-number";

/** W = L L' with L n×rank, rows in their old order. */
export type WideFactor = { readonly l: Wide; readonly rank: number };

/**
 * Cholesky factor with pivoting of a positive semidefinite matrix of wide numbers; it ends where what is left is lost in the
 * error of the matrix.
 *
 * Shapes    w n×n symmetric → l n×rank
 * Units     square root of those of w
 * Accuracy  of w within a few n (ε² + error) of its norm
 * Source    Higham, Analysis of the Cholesky decomposition of a semi-definite matrix, in Reliable Numerical Computation,
 *           1990, 161-185
 */
export function wideFactor(w: Wide, n: number, error: number): WideFactor {
  const rest: WideNumber[] = Array.from({ length: n * n }, (_, i) => ({ hi: w.hi[i], lo: w.lo[i] }));
  const first = new Float64Array(n).map((_, i) => w.hi[i * n + i]);
  const noise = 4 * n * error * Math.max(0, ...first);
  const open = Array.from({ length: n }, (_, i) => i);
  const columns: WideNumber[][] = [];
  while (open.length > 0) {
    let best = 0;
    open.forEach((i, k) => {
      if (rest[i * n + i].hi > rest[open[best] * n + open[best]].hi) best = k;
    });
    const [pivot] = open.splice(best, 1);
    if (!(rest[pivot * n + pivot].hi > noise)) break;
    const root = wideRoot(rest[pivot * n + pivot]);
    const column: WideNumber[] = Array.from({ length: n }, () => ({ hi: 0, lo: 0 }));
    column[pivot] = root;
    for (const i of open) column[i] = wideQuotient(rest[i * n + pivot], root);
    for (const i of open)
      for (const j of open) rest[i * n + j] = wideDifference(rest[i * n + j], wideTimes(column[i], column[j]));
    columns.push(column);
  }
  const rank = columns.length;
  const at = (k: number) => columns[k % rank][Math.floor(k / rank)];
  return {
    l: {
      hi: Float64Array.from({ length: n * rank }, (_, k) => at(k).hi),
      lo: Float64Array.from({ length: n * rank }, (_, k) => at(k).lo),
    },
    rank,
  };
}
