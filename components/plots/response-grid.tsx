"use client";

import { Maximize2 } from "lucide-react";
import { type CSSProperties, type PointerEvent, useMemo, useState } from "react";
import { formatNumber, formatSeconds } from "@/control/words/format-number";
import { joinClasses } from "../ui/join-classes";
import { ScrollBox } from "../ui/scroll-box";
import { AxisBar } from "./axis-bar";
import { ResponseCurves } from "./response-curves";
import type { ResponseCell, ResponseColumn, ResponseRow, TimeGrid } from "./response-data";
import { rowRange } from "./response-scale";
import { ResponseText } from "./response-text";
import { cellCaption, cellSentence, farLimits } from "./response-words";
import { TimeCursor } from "./time-cursor";

type ResponseGridProps = Readonly<{
  /** Names the grid for screen readers: "Coupled response". */
  caption: string;
  columns: readonly ResponseColumn[];
  rows: readonly ResponseRow[];
  time: TimeGrid;
  /** Offers every cell in full size. */
  onEnlarge?: (row: ResponseRow, column: ResponseColumn, cell: ResponseCell) => void;
}>;

/**
 * Small multiples: one column per command, one row per quantity, so that the cells off the diagonal are the cross-coupling. Time is
 * shared by all, the scale by each row. `captions`: columns say what is commanded, rows what the machine does.
 */
export function ResponseGrid({ caption, columns, rows, time, onEnlarge }: ResponseGridProps) {
  const [cursor, setCursor] = useState<number | null>(null);
  const last = time.samples - 1;
  const layout = {
    gridTemplateColumns: `minmax(6.5rem, max-content) repeat(${columns.length}, minmax(9rem, 1fr))`,
    "--cursor": cursor === null ? 0 : cursor / last,
  } as CSSProperties;
  const follow = (event: PointerEvent<HTMLElement>) => {
    if (event.pointerType !== "mouse") return;
    const { left, width } = event.currentTarget.getBoundingClientRect();
    setCursor(Math.round(Math.max(0, Math.min(1, (event.clientX - left) / width)) * last));
  };
  return (
    <figure aria-label={caption} className="min-w-0">
      <ScrollBox label={caption}>
        <div className="grid gap-1" style={layout} data-cursor={cursor === null ? undefined : "on"}>
          <span />
          {columns.map((column) => (
            <p key={column.key} className="flex items-baseline justify-center gap-2 pb-0.5 text-center text-sm text-soft">
              <AxisBar axis={column.axis} />
              {column.label}
            </p>
          ))}
          {rows.map((row) => (
            <ResponseLine
              key={row.key}
              {...{ row, columns, cursor, onEnlarge }}
              onPoint={follow}
              onLeave={() => setCursor(null)}
            />
          ))}
          <span />
          {columns.map((column) => (
            <p key={column.key} aria-hidden="true" className="flex justify-between px-1 font-mono text-xs text-soft">
              <span>0</span>
              <span>{formatSeconds(last * time.step)}</span>
            </p>
          ))}
        </div>
      </ScrollBox>
      <TimeCursor {...{ cursor, last }} step={time.step} onMove={setCursor} />
      <ResponseText {...{ rows, columns, time }} />
    </figure>
  );
}

type ResponseLineProps = Readonly<{
  row: ResponseRow;
  columns: readonly ResponseColumn[];
  cursor: number | null;
  onEnlarge: ResponseGridProps["onEnlarge"];
  onPoint: (event: PointerEvent<HTMLElement>) => void;
  onLeave: () => void;
}>;

function ResponseLine({ row, columns, cursor, onEnlarge, onPoint, onLeave }: ResponseLineProps) {
  const range = useMemo(() => rowRange(row), [row]);
  const far = farLimits(row);
  return (
    <>
      <div className="sticky left-0 z-10 flex bg-paper pr-2">
        <p className="flex flex-1 items-baseline gap-2 self-center text-sm">
          <AxisBar axis={row.axis} />
          <span>
            {row.label}, {row.unit}
            {far ? <span className="block text-xs text-soft">{far}</span> : null}
          </span>
        </p>
        <p className="flex flex-col justify-between pt-4 pb-0.5 text-right font-mono text-xs text-soft">
          <span>{formatNumber(range.high, 2)}</span>
          <span>{formatNumber(range.low, 2)}</span>
        </p>
      </div>
      {row.cells.map((cell, c) => {
        const column = columns[c];
        const corner = !cell ? "" : cursor === null ? cellCaption(cell) : formatNumber(cell.values[cursor] ?? Number.NaN);
        return (
          <div
            key={column.key}
            onPointerMove={onPoint}
            onPointerLeave={onLeave}
            className={joinClasses(
              "group response-cell relative h-28 border bg-sheet contain-layout contain-paint",
              cell?.own ? "border-control" : "border-rule",
            )}
          >
            <div
              role="img"
              aria-label={cell ? cellSentence(row, column, cell) : `${column.label}: no response of ${row.label}`}
              className="absolute inset-0"
            >
              {cell ? <ResponseCurves row={row} cell={cell} range={range} /> : null}
              <span className="absolute top-0.5 right-1.5 font-mono text-xs text-soft">{corner}</span>
            </div>
            {cell && onEnlarge ? (
              <button
                type="button"
                aria-label={`Enlarge ${column.label}: ${row.label}`}
                onClick={() => onEnlarge(row, column, cell)}
                className="no-print absolute top-0 left-0 flex size-6 items-center justify-center opacity-0 group-hover:opacity-100 focus-visible:opacity-100 pointer-coarse:opacity-100"
              >
                <Maximize2 aria-hidden size={13} />
              </button>
            ) : null}
          </div>
        );
      })}
    </>
  );
}
