import { StateMark } from "../ui/state-mark";
import type { Place } from "./grid-edits";
import type { Header } from "./header";
import { cellKey } from "./matrix-head";

const SHOWN = 4;

type GridProblemsProps = Readonly<{
  problems: ReadonlyMap<string, string>;
  rows: readonly Header[];
  columns: readonly Header[];
  onGoTo: (place: Place) => void;
}>;

/** The first few cells at fault, by name, each one press away. */
export function GridProblems({ problems, rows, columns, onGoTo }: GridProblemsProps) {
  const places = rows.flatMap((row, r) =>
    columns.flatMap((column, c) => {
      const message = problems.get(cellKey(r, c));
      return message ? [{ r, c, message, where: `row ${r + 1} ${row.label}, column ${c + 1} ${column.label}` }] : [];
    }),
  );
  if (places.length === 0) return null;
  return (
    <ul className="mt-1 text-sm">
      {places.slice(0, SHOWN).map(({ r, c, message, where }) => (
        <li key={where} className="flex items-baseline gap-1.5">
          <StateMark kind="unmet" word="Not right: " />
          <button type="button" className="min-h-6 text-left underline underline-offset-3" onClick={() => onGoTo({ r, c })}>
            {where}
          </button>
          <span>{message}</span>
        </li>
      ))}
      {places.length > SHOWN ? <li>and {places.length - SHOWN} more cells</li> : null}
    </ul>
  );
}
