import { CAUTIONS } from "@/control/words/cautions";
import type { Header } from "../../matrix/header";
import { exact } from "../../matrix/matrix-text";
import { gainUnit } from "../unit-text";
import type { GainMatrix } from "./gain-matrices";

/** A spreadsheet takes these for the start of a formula; full-width forms count in some locales. */
const FORMULA_START = /^\s*[=+\-@\uFF1D\uFF0B\uFF0D\uFF20]/;

/** One cell of text: nothing in it can become a formula, end the cell or end the line. */
export function plainCell(text: string): string {
  const flat = text.replace(/[\t\r\n]+/g, " ");
  return FORMULA_START.test(flat) ? `'${flat}` : flat;
}

const named = ({ label, unit }: Header) => plainCell(unit ? `${label} [${unit}]` : label);

function matrixText({ symbol, meaning, rows, columns, values }: GainMatrix): string {
  const units = new Set(rows.flatMap((row) => columns.map((column) => gainUnit(row.unit, column.unit))));
  const unit =
    units.size === 1 ? `, every entry in ${[...units][0]}` : ", each entry in the unit of its row per unit of its column";
  const head = [symbol, ...columns.map(named)].join("\t");
  const body = rows.map((row, r) => [named(row), ...values[r].map(exact)].join("\t"));
  return [plainCell(`${symbol}, ${meaning}${unit}`), head, ...body].join("\n");
}

export type GainFacts = {
  /** "LX-2 gantry, revision 2": what it is for, and what it is. */
  readonly title: string;
  readonly law: string;
  readonly observerLaw: string | null;
  readonly timeBase: string;
  readonly matrices: readonly GainMatrix[];
};

/** The gains for the clipboard, at full precision, with names, units, the sign equation, the time base and the cautions. */
export function gainText({ title, law, observerLaw, timeBase, matrices }: GainFacts): string {
  const facts = [title, law, ...(observerLaw ? [observerLaw] : []), timeBase].map(plainCell);
  return [
    ...facts,
    "",
    ...matrices.map((matrix) => `${matrixText(matrix)}\n`),
    ...CAUTIONS.map((text) => plainCell(`Caution: ${text}`)),
  ].join("\n");
}
