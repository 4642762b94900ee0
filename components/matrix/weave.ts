import type { CSSProperties } from "react";
import { axisStyle } from "../plots/axis-style";
import type { BlockShares } from "./block-shares";
import type { Header } from "./header";

export type Weave = "own" | "coupling" | "none";

/** An entry that is not zero weaves its axes together, or belongs to one axis acting on itself. */
export function weaveOf(row: Header, column: Header, value: number | null): Weave {
  if (value === 0 || value === null || row.axis === null || column.axis === null) return "none";
  return row.axis === column.axis ? "own" : "coupling";
}

export const hueStyle = (axis: number | null): CSSProperties =>
  axis === null ? {} : ({ "--hue": axisStyle(axis).hue } as CSSProperties);

/** The column is what acts, so a coupling block wears the column axis's hue. Weak shares are lifted so that they can be seen at all. */
export function cellStyle(row: Header, column: Header, shares: BlockShares): CSSProperties {
  return {
    "--hue": axisStyle(column.axis).hue,
    "--strength": Math.sqrt(shares(row.axis, column.axis)).toFixed(3),
  } as CSSProperties;
}
