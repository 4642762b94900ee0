import type { WideNumber } from "../linalg/wide-number";
import { addMultiple, divideWide, negative, type WideRows, wideAt, wideZeros } from "./wide-rows";

/** One elimination: rows `pivot` and `row` changed places, then multiples of row `pivot` left the rows below it. */
export type EliminationStep = { readonly pivot: number; readonly row: number; readonly factors: WideRows };

/** Similarity that leaves only the pivot in the given column below row `pivot` - 1; null when nothing is there. */
export function eliminateColumn(
  h: WideRows,
  n: number,
  pivot: number,
  column: (i: number) => WideNumber,
): EliminationStep | null {
  let row = pivot;
  for (let i = pivot + 1; i < n; i++) if (Math.abs(column(i).hi) > Math.abs(column(row).hi)) row = i;
  const top = column(row);
  if (top.hi === 0) return null;
  const factors = wideZeros(n);
  for (let i = pivot + 1; i < n; i++) {
    const { hi, lo } = divideWide(column(i === row ? pivot : i), top);
    factors.hi[i] = hi;
    factors.lo[i] = lo;
  }
  for (let j = 0; j < n && row !== pivot; j++) swapEntries(h, pivot * n + j, row * n + j);
  for (let i = 0; i < n && row !== pivot; i++) swapEntries(h, i * n + pivot, i * n + row);
  for (let i = pivot + 1; i < n; i++) {
    const factor = wideAt(factors, i);
    if (factor.hi === 0) continue;
    addMultiple(h, i * n, h, pivot * n, n, 1, negative(factor));
    addMultiple(h, pivot, h, i, n, n, factor);
  }
  return { pivot, row, factors };
}

/** Overwrites h by a similar matrix that counts as zero below its first subdiagonal; what stands there is left over from the way. */
export function reduceWide(h: WideRows, n: number): void {
  for (let pivot = 1; pivot + 1 < n; pivot++) eliminateColumn(h, n, pivot, (i) => wideAt(h, i * n + pivot - 1));
}

export function swapEntries(x: WideRows, i: number, j: number): void {
  [x.hi[i], x.hi[j]] = [x.hi[j], x.hi[i]];
  [x.lo[i], x.lo[j]] = [x.lo[j], x.lo[i]];
}
