"use client";

import type { OverlayTrace } from "../../plots/overlay-data";
import { OverlayPlot } from "../../plots/overlay-plot";
import type { ResponseCell, ResponseColumn, ResponseRow } from "../../plots/response-data";
import { cellSentence } from "../../plots/response-words";
import { Dialog } from "../../ui/dialog";

export type Enlarged = { readonly row: ResponseRow; readonly column: ResponseColumn; readonly cell: ResponseCell };

/** One cell in full size, to zoom into and to read off. Dashes tell the lines apart, as they tell designs apart elsewhere. */
function tracesOf({ row, cell }: Enlarged, step: number): OverlayTrace[] {
  const trace = (name: string, values: ArrayLike<number> | null | undefined, design: number | null): OverlayTrace[] =>
    values ? [{ key: name, name, values, step, axis: row.axis, design, held: row.held }] : [];
  return [
    ...trace("last saved revision", cell.ghost, null),
    ...trace(row.label, cell.values, 0),
    ...trace(`${row.label}, estimated`, cell.estimated, 1),
    ...trace(`${row.label}, full state`, cell.fullState, 2),
  ];
}

export function EnlargedCell({ shown, step, onClose }: Readonly<{ shown: Enlarged | null; step: number; onClose: () => void }>) {
  return (
    <Dialog open={shown !== null} onClose={onClose} title={shown ? `${shown.column.label}: ${shown.row.label}` : ""} wide>
      {shown ? (
        <OverlayPlot
          title={`${shown.row.label} after ${shown.column.label}`}
          quantity={shown.row.label}
          unit={shown.row.unit}
          traces={tracesOf(shown, step)}
          summary={[cellSentence(shown.row, shown.column, shown.cell)]}
          height={420}
        />
      ) : null}
    </Dialog>
  );
}
