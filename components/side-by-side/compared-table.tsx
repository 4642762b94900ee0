import { joinClasses } from "../ui/join-classes";
import { ScrollBox } from "../ui/scroll-box";
import { StateMark } from "../ui/state-mark";
import type { ComparedDesign } from "./compare-designs";
import { ComparedHead } from "./compared-head";
import { ComparedRowHeader, type SortControl } from "./compared-row-header";
import type { ComparedCell, ComparedRow, ComparedSection, Verdict } from "./compared-rows";

type ComparedTableProps = SortControl &
  Readonly<{
    plantId: string;
    designs: readonly ComparedDesign[];
    sections: readonly ComparedSection[];
  }>;

/** Every fact on a line of its own, one column per design; a thick rule stands left of what differs from the first. */
export function ComparedTable({ plantId, designs, sections, ...sort }: ComparedTableProps) {
  const caption = "Designs side by side";
  return (
    <ScrollBox label={caption}>
      <table className="w-full border-separate border-spacing-0 text-table print:text-xs">
        <caption className="sr-only">{caption}; the first design is what the others are held against</caption>
        <ComparedHead {...{ plantId, designs }} />
        {sections.map((section) => (
          <SectionRows key={section.title} {...{ section, designs }} {...sort} />
        ))}
      </table>
    </ScrollBox>
  );
}

type SectionRowsProps = SortControl & Readonly<{ section: ComparedSection; designs: readonly ComparedDesign[] }>;

function SectionRows({ section: { title, rows }, designs, ...sort }: SectionRowsProps) {
  return (
    <tbody>
      <tr>
        <th
          scope="rowgroup"
          colSpan={designs.length + 1}
          className="border-b border-ink px-2.5 pt-5 pb-1 text-left text-sm font-normal text-soft"
        >
          <span className="sticky left-2.5">{title}</span>
        </th>
      </tr>
      {rows.map((row) => (
        <Row key={row.key} {...{ row, designs }} {...sort} />
      ))}
    </tbody>
  );
}

type RowProps = SortControl & Readonly<{ row: ComparedRow; designs: readonly ComparedDesign[] }>;

function Row({ row, designs, ...sort }: RowProps) {
  return (
    <tr className="break-inside-avoid">
      <ComparedRowHeader row={row} {...sort} />
      {designs.map(({ id }, k) => (
        <td
          key={id}
          className={joinClasses(
            "border-b border-b-rule py-1 pr-2.5 align-baseline",
            row.prose ? "text-left whitespace-pre-line" : "text-right",
            row.differs[k] ? "border-l-4 border-l-ink bg-sheet pl-2 [print-color-adjust:exact]" : "pl-3",
          )}
        >
          {row.differs[k] ? <span className="sr-only">differs from the first: </span> : null}
          <CellContent cell={row.cells[k]} prose={row.prose} />
        </td>
      ))}
    </tr>
  );
}

/** The word says it; neither is met or not met, so ink alone sets them apart. */
const VERDICT_STYLE: Readonly<Record<Verdict, string>> = {
  best: "font-semibold text-ink",
  "best, shared": "font-semibold text-ink",
  worst: "text-soft italic",
  "worst, shared": "text-soft italic",
};

function CellContent({ cell, prose }: Readonly<{ cell: ComparedCell | null; prose?: boolean }>) {
  if (!cell) {
    return (
      <span className="text-soft">
        <span aria-hidden="true">–</span>
        <span className="sr-only">nothing</span>
      </span>
    );
  }
  const { text, exact, note, mark, verdict } = cell;
  return (
    <>
      <span
        className={joinClasses("inline-flex items-baseline gap-1.5", !prose && "font-mono")}
        title={prose ? undefined : exact}
      >
        {mark ? <StateMark {...mark} /> : null}
        {text}
        {verdict ? <span className={joinClasses("font-sans text-xs", VERDICT_STYLE[verdict])}> {verdict}</span> : null}
      </span>
      {note ? <span className="block text-sm text-soft print:text-xs">{note}</span> : null}
    </>
  );
}
