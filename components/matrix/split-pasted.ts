export type Separator = "tab" | "semicolon" | "comma" | "space";

/** `quoted` cells are taken as they stand; a blank in a row of separators is an empty cell. */
export type RawCell = { readonly text: string; readonly quoted: boolean };

/**
 * The separator of pasted text: a tab anywhere settles it, then a semicolon; commas separate unless the text is also
 * spaced and every comma stands inside a number, as in `1,5 2,5`.
 */
export function findSeparator(text: string): Separator {
  const bare = text.replace(/"(?:[^"]|"")*"/g, '""');
  if (bare.includes("\t")) return "tab";
  if (bare.includes(";")) return "semicolon";
  if (!bare.includes(",")) return "space";
  const spacedNumbers = bare.split(/\r\n|\r|\n/).every((line) =>
    line
      .trim()
      .split(/ +/)
      .every((word) => /^[^,]*(?:\d,\d[^,]*)?$/.test(word)),
  );
  return spacedNumbers && /\S +\S/.test(bare) ? "space" : "comma";
}

/** Splits into rows of cells. Quoted cells may hold separators, line ends and doubled quotes (RFC 4180). */
export function splitPasted(text: string, separator: Separator): RawCell[][] {
  const rows: RawCell[][] = [];
  const sign = { tab: "\t", semicolon: ";", comma: ",", space: " " }[separator];
  let row: RawCell[] = [];
  let at = 0;
  while (at <= text.length) {
    const { cell, end } = readCell(text, at, sign);
    row.push(cell);
    at = end;
    const stop = text[at];
    if (stop === sign) {
      at += 1;
      continue;
    }
    rows.push(row);
    row = [];
    if (at >= text.length) break;
    at += stop === "\r" && text[at + 1] === "\n" ? 2 : 1;
  }
  const tidy = separator === "space" ? rows.map((cells) => cells.filter(({ text: t, quoted }) => quoted || t !== "")) : rows;
  return tidy.filter((cells) => (separator === "space" ? cells.length > 0 : !isBlankLine(cells)));
}

const isBlankLine = (cells: readonly RawCell[]) => cells.length === 1 && !cells[0].quoted && cells[0].text.trim() === "";

function readCell(text: string, start: number, sign: string): { cell: RawCell; end: number } {
  let at = start;
  if (text[at] === '"') {
    let content = "";
    at += 1;
    while (at < text.length) {
      if (text[at] === '"' && text[at + 1] === '"') {
        content += '"';
        at += 2;
      } else if (text[at] === '"') {
        break;
      } else {
        content += text[at];
        at += 1;
      }
    }
    at += 1;
    // Anything between the closing quote and the separator belongs to the cell.
    const end = endOfCell(text, at, sign);
    return { cell: { text: content + text.slice(at, end), quoted: true }, end };
  }
  const end = endOfCell(text, at, sign);
  return { cell: { text: text.slice(at, end), quoted: false }, end };
}

function endOfCell(text: string, start: number, sign: string): number {
  let end = start;
  while (end < text.length && text[end] !== sign && text[end] !== "\n" && text[end] !== "\r") end += 1;
  return end;
}
