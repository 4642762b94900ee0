import { useMemo } from "react";
import { blockShares, type ScalingKind } from "./block-shares";
import { CellInput } from "./cell-input";
import type { Entries } from "./grid-edits";
import { cellLabel, GridRow } from "./grid-row";
import type { Header } from "./header";
import { cellKey, headerKey } from "./matrix-head";
import type { MatrixGridState } from "./use-matrix-grid";
import { hatchStrength } from "./weave";

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
  const strengths = useMemo(() => {
    const known = numbers.map((row) => row.map((value) => value ?? 0));
    const shares = blockShares(known, rows, columns, scaling);
    return rows.map((row) => columns.map((column) => hatchStrength(row, column, shares)));
  }, [numbers, rows, columns, scaling]);
  const { at, area, editing, finish, type, cancel } = grid;
  return (
    <tbody>
      {rows.map((row, r) => {
        const current = at.r === r;
        const selected = r >= area.top && r <= area.bottom;
        const label = cellLabel(name, r, row, at.c, columns[at.c]);
        return (
          <GridRow
            key={headerKey(row, r)}
            {...{ name, r, row, columns, readOnly }}
            gridId={grid.id}
            entries={entries[r]}
            numbers={numbers[r]}
            strengths={strengths[r]}
            problems={columns.map((_, c) => grid.problems.get(cellKey(r, c)))}
            current={current ? at.c : -1}
            selectedFrom={selected ? area.left : -1}
            selectedTo={selected ? area.right : -2}
            editor={
              current && editing ? (
                <CellInput {...{ label, ...editing }} onText={type} onFinish={finish} onCancel={cancel} />
              ) : null
            }
          />
        );
      })}
    </tbody>
  );
}
