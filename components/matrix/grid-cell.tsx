import { memo, type ReactNode } from "react";
import { formatNumber } from "@/control/words/format-number";
import type { BlockShares } from "./block-shares";
import type { Header } from "./header";
import { exact } from "./matrix-text";
import { cellStyle, weaveOf } from "./weave";
import { ZeroDot } from "./woven-matrix";

type GridCellProps = Readonly<{
  id: string;
  /** "A, row 2 pitch rate, column 3 ..." */
  label: string;
  r: number;
  c: number;
  row: Header;
  column: Header;
  entry: string;
  /** Evaluated; null where the entry cannot be. */
  value: number | null;
  shares: BlockShares;
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

/** Handlers sit on the grid, which finds the cell by `data-r` and `data-c`; a cell is drawn anew only when it changed. */
export const GridCell = memo(function GridCell(props: GridCellProps) {
  const { id, label, r, c, row, column, entry, value, shares, problem, selected, current, readOnly, echoId, children } = props;
  return (
    <td
      {...asCell(selected, readOnly)}
      id={id}
      data-r={r}
      data-c={c}
      data-weave={weaveOf(row, column, value)}
      data-zero={value === 0 || undefined}
      data-current={current || undefined}
      tabIndex={current && !children ? 0 : -1}
      aria-colindex={c + 2}
      aria-label={`${label}: ${entry}`}
      aria-invalid={problem ? true : undefined}
      aria-describedby={current ? echoId : undefined}
      title={problem ?? (value === null ? entry : exact(value))}
      style={cellStyle(row, column, shares)}
    >
      {value === 0 ? <ZeroDot /> : value === null || problem ? <EntryText text={entry} /> : formatNumber(value)}
      {children}
    </td>
  );
});

const SHOWN_CHARACTERS = 14;

/** A formula that has no value yet, shortened; the whole of it stands under the grid and in the title. */
function EntryText({ text }: Readonly<{ text: string }>) {
  return <>{text.length > SHOWN_CHARACTERS ? `${text.slice(0, SHOWN_CHARACTERS - 1)}…` : text}</>;
}
