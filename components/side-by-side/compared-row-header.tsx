"use client";

import { AxisBar } from "../plots/axis-bar";
import type { ComparedRow } from "./compared-rows";
import type { Sorting } from "./sort-designs";

/** The figure that the designs stand in order of, and what pressing another does. */
export type SortControl = Readonly<{ sorting: Sorting | null; onSort: (key: string) => void }>;

type ComparedRowHeaderProps = SortControl & Readonly<{ row: ComparedRow }>;

/** What a row says; by a figure the designs can be put in order. On paper only the word is left. */
export function ComparedRowHeader({ row: { axis, label, sort }, sorting, onSort }: ComparedRowHeaderProps) {
  const here = sort !== undefined && sorting?.key === sort.key ? sorting.order : null;
  return (
    <th
      scope="row"
      aria-sort={sort ? (here === null ? "none" : here === "least" ? "ascending" : "descending") : undefined}
      className="sticky left-0 z-1 border-b border-rule bg-paper px-2.5 py-1 text-left align-baseline font-normal print:static"
    >
      <span className="inline-flex items-baseline gap-2">
        {axis === undefined ? null : <AxisBar axis={axis} />}
        {sort ? (
          <>
            <button
              type="button"
              title={`Sort the designs by ${sort.words}`}
              className="no-print inline-flex min-h-6 items-center gap-1.5 text-left underline decoration-rule underline-offset-3 hover:decoration-ink"
              onClick={() => onSort(sort.key)}
            >
              {label}
              <Arrows order={here} />
            </button>
            <span className="hidden print:inline">{label}</span>
          </>
        ) : (
          label
        )}
      </span>
    </th>
  );
}

/** Columns run across: least first points to where the figures grow. */
function Arrows({ order }: Readonly<{ order: Sorting["order"] | null }>) {
  return (
    <svg aria-hidden="true" width="12" height="8" viewBox="0 0 12 8" className={order === null ? "text-control" : "text-ink"}>
      {order === "least" ? null : <path d="M0 4 5 0V8Z" fill="currentColor" />}
      {order === "most" ? null : <path d="M12 4 7 0V8Z" fill="currentColor" />}
    </svg>
  );
}
