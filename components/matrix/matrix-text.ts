import type { Rows } from "@/control/plant/model";

/** For the clipboard: tabs between, one row per line, every double at full precision so that it comes back bit for bit. */
export const valuesAsText = (values: Rows): string => values.map((row) => row.map(exact).join("\t")).join("\n");

export const exact = (value: number): string => (Object.is(value, -0) ? "-0" : String(value));

/** Entries as typed; a cell that holds a tab, a line end or a quote is quoted as spreadsheets do. */
export const entriesAsText = (entries: readonly (readonly string[])[]): string =>
  entries.map((row) => row.map(quoted).join("\t")).join("\n");

const quoted = (text: string) => (/[\t\r\n"]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text);
