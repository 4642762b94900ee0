import { useMemo } from "react";
import { blockShares, type ScalingKind } from "./block-shares";
import { CellInput } from "./cell-input";
import { GridCell } from "./grid-cell";
import { type Entries, holds } from "./grid-edits";
import type { Header } from "./header";
import { cellKey, headerKey, RowHead } from "./matrix-head";
import type { MatrixGridState } from "./use-matrix-grid";

type GridBodyProps = Readonly<{
  name: string;
  rows: readonly Header[];
  columns: readonly Header[];
  entries: Entries;
  numbers: readonly (readonly (number | null)[])[];
  scaling: ScalingKind | undefined;
  readOnly: boolean;
  grid: MatrixGridState;
}>;

export function GridBody({ name, rows, columns, entries, numbers, scaling, readOnly, grid }: GridBodyProps) {
  const shares = useMemo(() => {
    const known = numbers.map((row) => row.map((value) => value ?? 0));
    return blockShares(known, rows, columns, scaling);
  }, [numbers, rows, columns, scaling]);
  const { at, editing, finish, type, cancel } = grid;
  return (
    <tbody>
      {rows.map((row, r) => (
        <tr key={headerKey(row, r)} aria-rowindex={r + 2}>
          <RowHead row={row} roles />
          {columns.map((column, c) => {
            const current = at.r === r && at.c === c;
            const label = `${name}, row ${r + 1} ${row.label}, column ${c + 1} ${column.label}`;
            return (
              <GridCell
                key={cellKey(r, c)}
                id={grid.cellId(r, c)}
                {...{ label, r, c, row, column, shares, current, readOnly }}
                entry={entries[r][c]}
                value={numbers[r][c]}
                problem={grid.problems.get(cellKey(r, c))}
                selected={holds(grid.area, r, c)}
                echoId={`${grid.id}-echo`}
              >
                {current && editing ? (
                  <CellInput {...{ label, ...editing }} onText={type} onFinish={finish} onCancel={cancel} />
                ) : null}
              </GridCell>
            );
          })}
        </tr>
      ))}
    </tbody>
  );
}
