import { formatNumber } from "@/control/words/format-number";
import { StateMark } from "../ui/state-mark";
import type { Header } from "./header";
import { exact } from "./matrix-text";

type GridEchoProps = Readonly<{
  id: string;
  row: Header;
  column: Header;
  entry: string;
  value: number | null;
  unit: string | undefined;
  problem: string | undefined;
}>;

/** What the cell in hand holds: as typed, as evaluated, with its unit; or what is wrong with it. */
export function GridEcho({ id, row, column, entry, value, unit, problem }: GridEchoProps) {
  const plain = value !== null && Number(entry) === value;
  return (
    <p id={id} className="mt-1.5 flex min-h-6 flex-wrap items-baseline gap-x-2 text-table print:hidden">
      <span className="border border-rule bg-sheet px-2 text-soft">
        {row.label}, {column.label}
      </span>
      <span className="font-mono break-all">{entry}</span>
      {value === null || problem ? null : (
        <span className="font-mono" title={exact(value)}>
          {plain ? "" : `= ${formatNumber(value)} `}
          <span className="text-soft">{unit}</span>
        </span>
      )}
      {problem ? (
        <span className="inline-flex items-baseline gap-1.5">
          <StateMark kind="unmet" word="Not right: " />
          {problem}
        </span>
      ) : null}
    </p>
  );
}
