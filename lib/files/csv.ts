export type CsvCell = string | number | null;

/** What a spreadsheet takes for the start of a formula, also behind spaces; full-width forms count in some locales. */
const FORMULA_START = /^\s*[=+\-@\uFF1D\uFF0B\uFF0D\uFF20]|^[\t\r\n]/;
/** Semicolons and tabs too: a reader that splits at those must not find a formula behind one. */
const NEEDS_QUOTES = /[",;\t\r\n]|^\s|\s$/;

/** RFC 4180: comma, CRLF, every record padded to the widest. Numbers stay numbers and come back bit for bit. */
export function toCsv(records: readonly (readonly CsvCell[])[]): string {
  const width = records.reduce((widest, { length }) => Math.max(widest, length), 0);
  const line = (record: readonly CsvCell[]) =>
    Array.from({ length: width }, (_, index) => cellText(record[index] ?? null)).join(",");
  return records.map((record) => `${line(record)}\r\n`).join("");
}

function cellText(cell: CsvCell): string {
  if (cell === null) return "";
  if (typeof cell === "number") return numberText(cell);
  const text = FORMULA_START.test(cell) ? `'${cell}` : cell;
  return NEEDS_QUOTES.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}

/** The shortest decimal that is read back as the same double, at most 17 digits. */
function numberText(value: number): string {
  if (!Number.isFinite(value)) throw new RangeError("A number in a file must be finite.");
  return String(value);
}
