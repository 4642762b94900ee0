"use client";

import { Fragment, type ReactNode, useState } from "react";
import { joinClasses } from "./join-classes";
import { ScrollBox } from "./scroll-box";

export type Column<Row> = {
  readonly key: string;
  readonly header: ReactNode;
  readonly cell: (row: Row) => ReactNode;
  /** `figure`: right-aligned in the mono face. */
  readonly kind?: "text" | "figure";
  /** Makes the column sortable; null sorts last either way. */
  readonly sortBy?: (row: Row) => string | number | null;
};

export type Sort = { readonly column: string; readonly descending: boolean };

type DataTableProps<Row> = Readonly<{
  /** Says what the table is; shown only with `showCaption`. */
  caption: string;
  showCaption?: boolean;
  columns: readonly Column<Row>[];
  rows: readonly Row[];
  rowKey: (row: Row) => string;
  /** Given with `onSort` where the order lives in the URL, or alone as the first order. */
  sort?: Sort | null;
  onSort?: (sort: Sort) => void;
  /** The column that names the row; its cells are row headers. */
  rowHeader?: string;
  /** What is unfolded below a row, across all columns. */
  detail?: (row: Row) => ReactNode;
}>;

export function DataTable<Row>({
  caption,
  showCaption,
  columns,
  rows,
  rowKey,
  sort = null,
  onSort,
  rowHeader = columns[0]?.key,
  detail,
}: DataTableProps<Row>) {
  const [ownSort, setOwnSort] = useState(sort);
  const active = onSort ? sort : ownSort;
  const change = onSort ?? setOwnSort;
  const sortBy = columns.find(({ key }) => key === active?.column)?.sortBy;
  const ordered = active && sortBy ? [...rows].sort((a, b) => compare(sortBy(a), sortBy(b), active.descending)) : rows;
  return (
    <ScrollBox label={caption}>
      <table className="w-full border-collapse text-table">
        <caption className={showCaption ? "pb-1 text-left font-semibold" : "sr-only"}>{caption}</caption>
        <thead>
          <tr className="border-b border-ink">
            {columns.map((column) => (
              <HeaderCell key={column.key} column={column} sort={active} onSort={change} />
            ))}
          </tr>
        </thead>
        <tbody>
          {ordered.map((row) => {
            const below = detail?.(row);
            return (
              <Fragment key={rowKey(row)}>
                <BodyRow {...{ row, columns, rowHeader }} />
                {below ? (
                  <tr className="border-b border-rule">
                    <td colSpan={columns.length} className="py-2 pl-10">
                      {below}
                    </td>
                  </tr>
                ) : null}
              </Fragment>
            );
          })}
        </tbody>
      </table>
    </ScrollBox>
  );
}

const FIGURE = "text-right font-mono whitespace-nowrap";

type BodyRowProps<Row> = Readonly<{ row: Row; columns: readonly Column<Row>[]; rowHeader: string | undefined }>;

function BodyRow<Row>({ row, columns, rowHeader }: BodyRowProps<Row>) {
  return (
    <tr className="border-b border-rule">
      {columns.map((column) => {
        const content = column.cell(row);
        const style = joinClasses("px-2.5 py-1.5 align-baseline first:pl-0 last:pr-0", column.kind === "figure" && FIGURE);
        return column.key === rowHeader ? (
          <th key={column.key} scope="row" className={joinClasses(style, "text-left font-normal")}>
            {content}
          </th>
        ) : (
          <td key={column.key} className={style}>
            {content}
          </td>
        );
      })}
    </tr>
  );
}

type HeaderCellProps<Row> = Readonly<{ column: Column<Row>; sort: Sort | null; onSort: (sort: Sort) => void }>;

function HeaderCell<Row>({ column, sort, onSort }: HeaderCellProps<Row>) {
  const style = joinClasses(
    "px-2.5 py-1.5 align-bottom text-sm font-normal text-soft first:pl-0 last:pr-0",
    column.kind === "figure" ? "text-right" : "text-left",
  );
  if (!column.sortBy) {
    return (
      <th scope="col" className={style}>
        <span className="inline-flex min-h-6 items-center">{column.header}</span>
      </th>
    );
  }
  const here = sort?.column === column.key;
  const direction = sort?.descending ? "descending" : "ascending";
  return (
    <th scope="col" aria-sort={here ? direction : "none"} className={style}>
      <button
        type="button"
        className="inline-flex min-h-6 items-center gap-1 hover:text-ink"
        onClick={() => onSort({ column: column.key, descending: here ? !sort.descending : false })}
      >
        {column.header}
        <svg aria-hidden="true" width="8" height="10" viewBox="0 0 8 10" className={here ? "text-ink" : "text-control"}>
          {!here || direction === "ascending" ? <path d="M4 0 8 4H0Z" fill="currentColor" /> : null}
          {!here || direction === "descending" ? <path d="M4 10 8 6H0Z" fill="currentColor" /> : null}
        </svg>
      </button>
    </th>
  );
}

function compare(a: string | number | null, b: string | number | null, descending: boolean): number {
  if (a === null || b === null) return a === b ? 0 : a === null ? 1 : -1;
  const order =
    typeof a === "string" && typeof b === "string" ? a.localeCompare(b, "en", { numeric: true }) : Number(a) - Number(b);
  return descending ? -order : order;
}
