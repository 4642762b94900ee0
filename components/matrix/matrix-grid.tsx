"use client";

import { useMemo } from "react";
import { ScrollBox } from "../ui/scroll-box";
import type { ScalingKind } from "./block-shares";
import { GridBody } from "./grid-body";
import { GridEcho } from "./grid-echo";
import type { Entries } from "./grid-edits";
import { GridProblems } from "./grid-problems";
import type { Header } from "./header";
import { cellKey, MatrixHead } from "./matrix-head";
import { useGridEvents } from "./use-grid-events";
import type { OnEntries, OuterHistory } from "./use-grid-history";
import { useMatrixGrid } from "./use-matrix-grid";

export type MatrixGridProps = Readonly<{
  /** The letter or short name: "A". */
  name: string;
  caption: string;
  note?: string;
  rows: readonly Header[];
  columns: readonly Header[];
  /** Expression texts, one row per row header. */
  entries: Entries;
  /** One call per step that can be undone, paste included. */
  onChange?: OnEntries;
  /** Keyed "r,c" from zero: what is wrong with the entry there. */
  problems?: ReadonlyMap<string, string>;
  /** The evaluated matrix; null, or null at a cell, where it cannot be evaluated. */
  values?: readonly (readonly (number | null)[])[] | null;
  /** Unit of an entry, shown with the cell in hand. */
  entryUnit?: (r: number, c: number) => string;
  scaling?: ScalingKind;
  /** For weights: an entry is mirrored across the diagonal. */
  symmetric?: boolean;
  readOnly?: boolean;
  /** Of the whole document; without it the grid keeps its own. */
  history?: OuterHistory;
}>;

const NO_PROBLEMS: ReadonlyMap<string, string> = new Map();

/** A table may be given this role (W3C, ARIA in HTML); given as an attribute set, it keeps the table's layout and print. */
const asGrid = (readOnly: boolean) =>
  ({ role: "grid", "aria-multiselectable": true, "aria-readonly": readOnly || undefined }) as const;

/** What a text is worth without an evaluated matrix: its number, if it is one. */
function worth(values: MatrixGridProps["values"], entries: Entries, r: number, c: number): number | null {
  const given = values ? values[r]?.[c] : Number(entries[r][c].trim() || Number.NaN);
  return given === undefined || given === null || !Number.isFinite(given) ? null : given;
}

/**
 * A matrix to type into: one tab stop, arrows move, Enter or F2 edits, typing replaces, Escape cancels, Shift selects, Delete
 * clears, copy and paste speak with spreadsheets, undo and redo. Entries are texts; what they are worth comes back in `values`.
 */
export function MatrixGrid(props: MatrixGridProps) {
  const { name, caption, note, rows, columns, entries, onChange, problems = NO_PROBLEMS, values = null, entryUnit } = props;
  const { scaling, symmetric = false, readOnly = onChange === undefined, history } = props;
  const grid = useMatrixGrid({ entries, onChange, history, symmetric, readOnly, problems });
  const events = useGridEvents(grid, rows.length, columns.length, readOnly);
  const numbers = useMemo(() => entries.map((row, r) => row.map((_, c) => worth(values, entries, r, c))), [values, entries]);
  const { at, id } = grid;
  if (rows.length === 0 || columns.length === 0) return null;
  return (
    <figure className="min-w-0">
      <figcaption className="mb-1 flex flex-wrap items-baseline gap-x-3">
        <span id={`${id}-name`} className="font-semibold">
          {name} · {caption}
        </span>
        {note ? <span className="text-sm text-soft">{note}</span> : null}
      </figcaption>
      <ScrollBox label={`${name}, ${caption}`}>
        <table
          {...asGrid(readOnly)}
          {...events}
          className="weave"
          aria-labelledby={`${id}-name`}
          aria-rowcount={rows.length + 1}
          aria-colcount={columns.length + 1}
        >
          <MatrixHead columns={columns} roles />
          <GridBody {...{ name, rows, columns, entries, numbers, scaling, readOnly, grid }} />
        </table>
      </ScrollBox>
      <GridEcho
        id={`${id}-echo`}
        row={rows[at.r]}
        column={columns[at.c]}
        entry={grid.editing?.text ?? entries[at.r][at.c]}
        value={grid.editing ? null : numbers[at.r][at.c]}
        unit={entryUnit?.(at.r, at.c)}
        problem={grid.problems.get(cellKey(at.r, at.c))}
      />
      <GridProblems problems={grid.problems} rows={rows} columns={columns} onGoTo={grid.go} />
      <p role="status" className="text-sm text-soft print:hidden">
        {grid.said}
      </p>
    </figure>
  );
}
