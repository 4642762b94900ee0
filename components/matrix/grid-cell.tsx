import { memo, type ReactNode } from "react";
import { formatNumber } from "@/control/words/format-number";
import { exact } from "./matrix-text";
import { cellStyle, weaveOf } from "./weave";
import { ZeroDot } from "./woven-matrix";

/** Plain values only, so that a cell is drawn anew only when something in it changed. */
type GridCellProps = Readonly<{
  id: string;
  /** "A, row 2 pitch rate, column 3 ..." */
  label: string;
  r: number;
  c: number;
  rowAxis: number | null;
  columnAxis: number | null;
  entry: string;
  /** Evaluated; null where the entry cannot be. */
  value: number | null;
  strength: string;
  problem: string | undefined;
  selected: boolean;
  /** The one cell of the grid in the tab order. */
  current: boolean;
  readOnly: boolean;
  echoId: string;
  /** The input while the cell is edited. */
  children: ReactNode;
}>;

/** A table's cell may be given this role (W3C, ARIA in HTML); see `asGrid`. */
const asCell = (selected: boolean, readOnly: boolean) =>
  ({ role: "gridcell", "aria-selected": selected, "aria-readonly": readOnly || undefined }) as const;

/** Handlers sit on the grid, which finds the cell by `data-r` and `data-c`. */
export const GridCell = memo(function GridCell(props: GridCellProps) {
  const { id, label, r, c, rowAxis, columnAxis, entry, value, strength, problem, selected, current, readOnly, echoId, children } =
    props;
  const shown = value === null || problem ? shortened(entry) : formatNumber(value);
  return (
    <td
      {...asCell(selected, readOnly)}
      id={id}
      data-r={r}
      data-c={c}
      data-weave={weaveOf(rowAxis, columnAxis, value)}
      data-zero={value === 0 || undefined}
      data-current={current || undefined}
      tabIndex={current && !children ? 0 : -1}
      aria-colindex={c + 2}
      aria-label={shown === entry ? `${label}: ${entry}` : `${label}: ${shown}, written ${entry}`}
      aria-invalid={problem ? true : undefined}
      aria-describedby={current ? echoId : undefined}
      title={problem ?? (value === null ? entry : exact(value))}
      style={cellStyle(columnAxis, strength)}
    >
      {value === 0 && !problem ? <ZeroDot /> : shown}
      {children}
    </td>
  );
});

const SHOWN_CHARACTERS = 14;

/** A formula that has no value yet; the whole of it stands under the grid and in the title. */
const shortened = (text: string) => (text.length > SHOWN_CHARACTERS ? `${text.slice(0, SHOWN_CHARACTERS - 1)}…` : text);
