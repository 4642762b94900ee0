import { useId } from "react";
import type { Rows } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import { CopyButton } from "../ui/copy-button";
import { joinClasses } from "../ui/join-classes";
import { ScrollBox } from "../ui/scroll-box";
import { blockShares, type ScalingKind } from "./block-shares";
import type { Header } from "./header";
import { cellKey, headerKey, MatrixHead, RowHead } from "./matrix-head";
import { exact, valuesAsText } from "./matrix-text";
import { cellStyle, hatchStrength, weaveOf } from "./weave";

type WovenMatrixProps = Readonly<{
  /** The letter or short name: "K". */
  name: string;
  /** What it does, beside the name: "what each actuator does". */
  caption: string;
  /** How to read it. */
  note?: string;
  rows: readonly Header[];
  columns: readonly Header[];
  values: Rows;
  scaling?: ScalingKind;
  /** Marks an entry, for example where it differs from another design's. */
  marked?: (r: number, c: number) => boolean;
  /** Off where the page offers its own way out, with the cautions beside it. */
  copy?: boolean;
}>;

/** A matrix to read: coupling is seen at a glance, figures line up, full precision on hover and in the copy. */
export function WovenMatrix({ name, caption, note, rows, columns, values, scaling, marked, copy = true }: WovenMatrixProps) {
  const id = useId();
  const shares = blockShares(values, rows, columns, scaling);
  return (
    <figure className="min-w-0">
      <figcaption className="mb-1 flex flex-wrap items-baseline gap-x-3">
        <span id={id} className="font-semibold">
          {name} · {caption}
        </span>
        {note ? <span className="text-sm text-soft">{note}</span> : null}
        {copy ? <CopyButton text={() => valuesAsText(values)} label={`Copy ${name}`} /> : null}
      </figcaption>
      <ScrollBox label={`${name}, ${caption}`}>
        <table className="weave" aria-labelledby={id}>
          <MatrixHead columns={columns} />
          <tbody>
            {rows.map((row, r) => (
              <tr key={headerKey(row, r)}>
                <RowHead row={row} />
                {columns.map((column, c) => {
                  const value = values[r][c];
                  return (
                    <td
                      key={cellKey(r, c)}
                      data-weave={weaveOf(row.axis, column.axis, value)}
                      data-zero={value === 0 || undefined}
                      style={cellStyle(column.axis, hatchStrength(row, column, shares))}
                      title={exact(value)}
                      className={joinClasses(marked?.(r, c) && "font-bold underline decoration-2 underline-offset-3")}
                    >
                      {value === 0 ? <ZeroDot /> : formatNumber(value)}
                    </td>
                  );
                })}
              </tr>
            ))}
          </tbody>
        </table>
      </ScrollBox>
    </figure>
  );
}

/** An exact zero stands back; it is still read out, and copied, as 0. */
export function ZeroDot() {
  return (
    <>
      <span aria-hidden="true" className="zero-dot">
        ·
      </span>
      <span className="sr-only">0</span>
    </>
  );
}
