import Link from "next/link";
import { AxisBar, AxisSample } from "../plots/axis-bar";
import { designDash, designDashName } from "../plots/axis-style";
import { joinClasses } from "../ui/join-classes";
import { ScrollBox } from "../ui/scroll-box";
import { StateMark } from "../ui/state-mark";
import type { CompareCell, Compared, CompareRow, CompareSection } from "./compare-types";
import { type Mark, marksOf } from "./difference-marks";

type CompareTableProps = Readonly<{ designs: readonly Compared[]; sections: readonly CompareSection[]; plantId: string }>;

/** Every fact of the designs aligned. What is not the first design's stands behind a thick rule; best and last are said in words. */
export function CompareTable({ designs, sections, plantId }: CompareTableProps) {
  return (
    <ScrollBox label="Designs side by side">
      <table className="w-full border-collapse text-table">
        <caption className="sr-only">Designs side by side; what differs from the first design is said so</caption>
        <thead>
          <tr className="border-b border-rule text-left align-bottom">
            <td className="min-w-36" />
            {designs.map((design, place) => (
              <DesignHead key={design.id} {...{ design, place, plantId }} />
            ))}
          </tr>
        </thead>
        {sections.map((section) => (
          <tbody key={section.key}>
            <tr>
              <th
                scope="rowgroup"
                colSpan={designs.length + 1}
                className="border-b border-ink px-2.5 pt-5 pb-1 text-left text-sm font-normal text-soft"
              >
                {section.title}
              </th>
            </tr>
            {section.rows.map((row) => (
              <ComparedRow key={row.key} row={row} ids={designs.map(({ id }) => id)} />
            ))}
          </tbody>
        ))}
      </table>
    </ScrollBox>
  );
}

type DesignHeadProps = Readonly<{ design: Compared; place: number; plantId: string }>;

function DesignHead({ design: { id, designId, designName, number, plantRevision }, place, plantId }: DesignHeadProps) {
  return (
    <th scope="col" className="min-w-44 px-2.5 pb-2 font-normal">
      <span className="flex items-center gap-2">
        <AxisSample axis={null} dash={designDash(place)} />
        <Link href={`/plants/${plantId}/designs/${designId}?revision=${id}`} className="font-semibold">
          {designName}
        </Link>
      </span>
      <span className="block text-sm text-soft">
        <span className="sr-only">drawn {designDashName(place)}, </span>
        revision {number}, on plant revision {plantRevision.number}
      </span>
    </th>
  );
}

function ComparedRow({ row, ids }: Readonly<{ row: CompareRow; ids: readonly string[] }>) {
  const marks = marksOf(row);
  return (
    <tr className="break-inside-avoid border-b border-rule align-baseline">
      <th scope="row" className="sticky left-0 z-10 bg-paper px-2.5 py-1.5 text-left font-normal">
        <span className="inline-flex items-baseline gap-2">
          {row.axis === undefined ? null : <AxisBar axis={row.axis} />}
          {row.label}
        </span>
      </th>
      {row.cells.map((cell, place) => (
        <ComparedCell key={ids[place]} cell={cell} mark={marks[place]} prose={row.prose === true} />
      ))}
    </tr>
  );
}

type ComparedCellProps = Readonly<{ cell: CompareCell | null; mark: Mark; prose: boolean }>;

function ComparedCell({ cell, mark: { differs, standing }, prose }: ComparedCellProps) {
  const style = joinClasses(
    "px-2.5 py-1.5",
    prose ? "text-left whitespace-pre-line" : "text-right font-mono",
    differs ? "border-l-[3px] border-ink bg-sheet" : "border-l-[3px] border-transparent",
  );
  if (!cell) {
    return (
      <td className={joinClasses(style, "text-soft")}>
        <span aria-hidden="true">–</span>
        <span className="sr-only">{differs ? "differs: none" : "none"}</span>
      </td>
    );
  }
  return (
    <td className={style}>
      {differs ? <span className="sr-only">differs: </span> : null}
      <span title={cell.exact === cell.text ? undefined : cell.exact} className="inline-flex items-baseline gap-1.5">
        {cell.beyond ? <StateMark kind="unmet" word="Beyond its limit: " /> : null}
        {cell.text}
        {standing ? <Standing standing={standing} /> : null}
      </span>
      {cell.note ? <span className="block font-sans text-sm text-soft">{cell.note}</span> : null}
    </td>
  );
}

function Standing({ standing }: Readonly<{ standing: "best" | "last" }>) {
  return (
    <span className={joinClasses("font-sans text-xs font-semibold", standing === "best" ? "text-met-mark" : "text-unmet-mark")}>
      {standing}
    </span>
  );
}
