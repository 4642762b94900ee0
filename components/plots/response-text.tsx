"use client";

import { useState } from "react";
import { Disclosure } from "../ui/disclosure";
import { ScrollBox } from "../ui/scroll-box";
import type { ResponseColumn, ResponseRow, TimeGrid } from "./response-data";
import { cellSentence } from "./response-words";
import { SampledValues } from "./sampled-values";

type ResponseTextProps = Readonly<{ rows: readonly ResponseRow[]; columns: readonly ResponseColumn[]; time: TimeGrid }>;

/** The same responses in words and figures, made when opened. */
export function ResponseText({ rows, columns, time }: ResponseTextProps) {
  const [opened, setOpened] = useState(false);
  return (
    <Disclosure summary="These responses in words and figures" onOpen={() => setOpened(true)}>
      {opened
        ? columns.map((column, c) => (
            <section key={column.key} aria-label={column.label} className="mb-4">
              <ul className="mb-2 list-disc pl-5 text-table">
                {rows.map((row) => {
                  const cell = row.cells[c];
                  return cell ? <li key={row.key}>{cellSentence(row, column, cell)}</li> : null;
                })}
              </ul>
              <ScrollBox label={`${column.label}, in figures`}>
                <SampledValues
                  caption={column.label}
                  time={time}
                  series={rows.flatMap(({ key, label, unit, cells }) => {
                    const cell = cells[c];
                    if (!cell) return [];
                    return [
                      { key, label, unit, values: cell.values },
                      ...beside(`${key} estimated`, `${label}, estimated`, unit, cell.estimated),
                      ...beside(`${key} full state`, `${label}, full state`, unit, cell.fullState),
                    ];
                  })}
                />
              </ScrollBox>
            </section>
          ))
        : null}
    </Disclosure>
  );
}

/** A thin line drawn beside a curve stands beside it in the figures, too. */
const beside = (key: string, label: string, unit: string, values: ArrayLike<number> | null | undefined) =>
  values ? [{ key, label, unit, values }] : [];
