import type { Rows } from "@/control/plant/model";
import type { Header } from "./header";

/**
 * How scaling enters: a `map` takes the column's signal to the row's (A, B, C, K, L); a `form` weighs a product of both
 * (state and input weights), so that larger deviations make an entry count for more on either side.
 */
export type ScalingKind = "map" | "form";

/** Share of each block of axes in the whole matrix's Frobenius norm, 0 to 1, after scaling; asked by row axis and column axis. */
export type BlockShares = (row: number | null, column: number | null) => number;

const scaleOf = (header: Header) => (header.scale && header.scale > 0 ? header.scale : 1);
const keyOf = (row: number | null, column: number | null) => `${row} ${column}`;

export function blockShares(
  values: Rows,
  rows: readonly Header[],
  columns: readonly Header[],
  kind: ScalingKind = "map",
): BlockShares {
  const sums = new Map<string, number>();
  const scaled = (r: number, c: number) => {
    const rowScale = kind === "map" ? 1 / scaleOf(rows[r]) : scaleOf(rows[r]);
    return (values[r]?.[c] ?? 0) * rowScale * scaleOf(columns[c]);
  };
  let largest = 0;
  for (const r of rows.keys()) for (const c of columns.keys()) largest = Math.max(largest, Math.abs(scaled(r, c)));
  if (!(largest > 0) || !Number.isFinite(largest)) return () => 0;
  let total = 0;
  for (const [r, row] of rows.entries()) {
    for (const [c, column] of columns.entries()) {
      // Divided by the largest first: squares of very large or small entries would leave the range of doubles.
      const square = (scaled(r, c) / largest) ** 2;
      const key = keyOf(row.axis, column.axis);
      sums.set(key, (sums.get(key) ?? 0) + square);
      total += square;
    }
  }
  return (row, column) => Math.sqrt((sums.get(keyOf(row, column)) ?? 0) / total);
}
