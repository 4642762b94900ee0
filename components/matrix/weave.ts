import type { CSSProperties } from "react";
import { axisStyle } from "../plots/axis-style";
import type { BlockShares } from "./block-shares";
import type { Header } from "./header";

export type Weave = "own" | "coupling" | "none";

/** An entry that is not zero weaves its axes together, or belongs to one axis acting on itself. */
export function weaveOf(row: number | null, column: number | null, value: number | null): Weave {
  if (value === 0 || value === null || row === null || column === null) return "none";
  return row === column ? "own" : "coupling";
}

export const hueStyle = (axis: number | null): CSSProperties =>
  axis === null ? {} : ({ "--hue": axisStyle(axis).hue } as CSSProperties);

/** Strength of a block's hatch, 0 to 1 in hundredths. Weak shares are lifted so that they can be seen at all. */
export const hatchStrength = (row: Header, column: Header, shares: BlockShares): string =>
  Math.sqrt(shares(row.axis, column.axis)).toFixed(2);

/** The column is what acts, so a coupling block wears the column axis's hue. */
export const cellStyle = (column: number | null, strength: string): CSSProperties =>
  ({ "--hue": axisStyle(column).hue, "--strength": strength }) as CSSProperties;
