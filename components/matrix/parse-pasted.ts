import { findSeparator, type RawCell, type Separator, splitPasted } from "./split-pasted";

export type PasteProblem = { readonly row: number; readonly column: number; readonly message: string };

export type Pasted = {
  /** As wide as the widest row; every entry is plain text that can stand in a cell. */
  readonly entries: readonly (readonly string[])[];
  /** Cells that could not be read with certainty. Their text is kept, so that nothing is lost. */
  readonly problems: readonly PasteProblem[];
};

const MINUSES = /[\u2212\u2012\u2013\ufe63\uff0d]/g;
/** Spaces that spreadsheets and documents put between groups of digits or around a number. */
const HARD_SPACES = "\u00a0\u2007\u2009\u202f";
const GROUPING_SPACE = new RegExp(`(\\d)[ ${HARD_SPACES}'’](?=\\d{3}(?!\\d))`, "g");
const COMMA_NUMBER = /^[+-]?\d*,\d+(e[+-]?\d+)?$/i;
const COULD_GROUP = /^[+-]?[1-9]\d{0,2},\d{3}(e[+-]?\d+)?$/i;
const GROUPED_BY_COMMA = /^[+-]?\d{1,3}(,\d{3})+\.\d+(e[+-]?\d+)?$|^[+-]?\d{1,3}(,\d{3}){2,}(e[+-]?\d+)?$/i;
const GROUPED_BY_POINT = /^[+-]?\d{1,3}(\.\d{3})+,\d+(e[+-]?\d+)?$|^[+-]?\d{1,3}(\.\d{3}){2,}(e[+-]?\d+)?$/i;

/**
 * Reads what a spreadsheet, a file or a document put on the clipboard. `columns` is the room there is: a single column of decimal
 * commas then is not taken for two columns. Blank cells become zero.
 */
export function parsePasted(text: string, columns = Number.POSITIVE_INFINITY): Pasted {
  const spaced = settleHardSpaces(text.replace(/^\ufeff/, ""));
  const alone = ONE_COMMA_ALONE.exec(spaced.trim());
  if (alone && columns > 1) return lonelyComma(alone[0]);
  const found = findSeparator(spaced);
  const separator = found === "comma" && isColumnOfDecimals(spaced, columns) ? "space" : found;
  const rows = splitPasted(spaced, separator).map((cells) => trimEnd(cells, columns));
  const width = rows.reduce((most, cells) => Math.max(most, cells.length), 0);
  const decimalComma = separator !== "comma" && rows.some((cells) => cells.some((cell) => provesDecimalComma(tidy(cell.text))));
  const problems: PasteProblem[] = [];
  const entries = rows.map((cells, row) =>
    Array.from({ length: width }, (_, column) => {
      const read = readEntry(cells[column]?.text ?? "", separator, decimalComma);
      if (read.message) problems.push({ row, column, message: read.message });
      return read.entry;
    }),
  );
  return { entries, problems };
}

/** One number with a decimal comma, or a row of two: nothing in the text tells. */
const ONE_COMMA_ALONE = /^[+\-\u2212]?\d+,\d+(e[+\-\u2212]?\d+)?$/i;
function lonelyComma(text: string): Pasted {
  const message = `“${text}” may be one number with a decimal comma or two entries. Write the one you mean.`;
  return { entries: [[text]], problems: [{ row: 0, column: 0, message }] };
}

const HARD = new RegExp(`[${HARD_SPACES}]`, "g");
const HARD_GROUPING = new RegExp(`(\\d)[${HARD_SPACES}](?=\\d{3}(?!\\d))`, "g");

/** Hard spaces before exactly three digits group thousands; where nothing else separates, the others separate. */
function settleHardSpaces(text: string): string {
  const joined = text.replace(HARD_GROUPING, "$1");
  return /[\t;,]/.test(joined) ? joined : joined.replace(HARD, " ");
}

/** Each line one number with a decimal comma, and room for one column only. */
function isColumnOfDecimals(text: string, columns: number): boolean {
  const lines = text.split(/\r\n|\r|\n/).filter((line) => line.trim() !== "");
  return columns === 1 && lines.every((line) => (line.match(/,/g)?.length ?? 0) <= 1);
}

/** A separator at the end of a line makes an empty cell too many. */
function trimEnd(cells: readonly RawCell[], columns: number): readonly RawCell[] {
  const last = cells.at(-1);
  return cells.length > columns && last && !last.quoted && last.text.trim() === "" ? cells.slice(0, -1) : cells;
}

const tidy = (text: string) => text.replace(MINUSES, "-").replace(HARD, " ").trim().replace(GROUPING_SPACE, "$1");

const provesDecimalComma = (text: string) => (COMMA_NUMBER.test(text) && !COULD_GROUP.test(text)) || GROUPED_BY_POINT.test(text);

function readEntry(raw: string, separator: Separator, decimalComma: boolean): { entry: string; message?: string } {
  const text = tidy(raw);
  if (text === "") return { entry: "0" };
  if (/^#|^=/.test(text))
    return { entry: text, message: `“${text}” is a spreadsheet's error or formula, not an entry. Paste its value.` };
  if (GROUPED_BY_COMMA.test(text)) return { entry: text.replaceAll(",", "") };
  if (GROUPED_BY_POINT.test(text)) return { entry: text.replaceAll(".", "").replace(",", ".") };
  if (COMMA_NUMBER.test(text)) {
    const decimal = text.replace(",", ".").replace(/^([+-]?)\./, "$10.");
    const certain = decimalComma || separator === "semicolon" || !COULD_GROUP.test(text);
    if (certain) return { entry: decimal };
    return { entry: text, message: `“${text}” may be ${decimal} or ${text.replace(",", "")}. Write the one you mean.` };
  }
  return { entry: text };
}

/** One entry typed by hand, read as one pasted alone between tabs. Left empty it is zero. */
export function readTyped(text: string): { entry: string; message?: string } {
  return readEntry(text, "tab", false);
}
