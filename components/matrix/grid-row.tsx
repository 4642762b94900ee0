import { memo, type ReactNode } from "react";
import { GridCell } from "./grid-cell";
import type { Header } from "./header";
import { cellKey, RowHead } from "./matrix-head";

type GridRowProps = Readonly<{
  name: string;
  gridId: string;
  r: number;
  row: Header;
  columns: readonly Header[];
  entries: readonly string[];
  numbers: readonly (number | null)[];
  strengths: readonly string[];
  problems: readonly (string | undefined)[];
  /** Column of the cell in hand, or -1; and the selected columns, both ends included, or -1 and -2. */
  current: number;
  selectedFrom: number;
  selectedTo: number;
  readOnly: boolean;
  /** Stands in the current cell while it is edited. */
  editor: ReactNode;
}>;

export const GridRow = memo(function GridRow(props: GridRowProps) {
  const {
    name,
    gridId,
    r,
    row,
    columns,
    entries,
    numbers,
    strengths,
    problems,
    current,
    selectedFrom,
    selectedTo,
    readOnly,
    editor,
  } = props;
  return (
    <tr aria-rowindex={r + 2}>
      <RowHead row={row} roles />
      {columns.map((column, c) => (
        <GridCell
          key={cellKey(r, c)}
          id={`${gridId}-${r}-${c}`}
          label={cellLabel(name, r, row, c, column)}
          r={r}
          c={c}
          rowAxis={row.axis}
          columnAxis={column.axis}
          entry={entries[c]}
          value={numbers[c]}
          strength={strengths[c]}
          problem={problems[c]}
          selected={c >= selectedFrom && c <= selectedTo}
          current={c === current}
          readOnly={readOnly}
          echoId={`${gridId}-echo`}
        >
          {c === current ? editor : null}
        </GridCell>
      ))}
    </tr>
  );
}, sameRow);

export const cellLabel = (name: string, r: number, row: Header, c: number, column: Header) =>
  `${name}, row ${r + 1} ${row.label}, column ${c + 1} ${column.label}`;

/** Pages make headers and evaluated values anew on every key; only what they say decides whether a row is drawn again. */
function sameRow(a: GridRowProps, b: GridRowProps): boolean {
  return (Object.keys(a) as (keyof GridRowProps)[]).every((key) => same(a[key], b[key]));
}

function same(a: unknown, b: unknown): boolean {
  if (Object.is(a, b)) return true;
  if (Array.isArray(a) && Array.isArray(b)) return a.length === b.length && a.every((item, index) => same(item, b[index]));
  if (!isHeader(a) || !isHeader(b)) return false;
  return a.label === b.label && a.unit === b.unit && a.axis === b.axis;
}

const isHeader = (value: unknown): value is Header =>
  typeof value === "object" && value !== null && "label" in value && "axis" in value;
