import { type Area, areaOf, type Entries, fill, type Place, writeBlock } from "./grid-edits";
import { parsePasted } from "./parse-pasted";

/** An entry whose text can be read in two ways, or in none; it stands until the entry changes. */
export type Doubt = { readonly r: number; readonly c: number; readonly entry: string; readonly message: string };

export type PasteOutcome = {
  readonly entries: Entries;
  readonly doubts: readonly Doubt[];
  /** What the paste covers, to be selected. */
  readonly area: Area;
  /** Said once, politely. */
  readonly said: string;
};

/** Puts clipboard text into a grid with its first entry at the corner of `area`; one entry fills the whole of a larger area. */
export function pasteInto(entries: Entries, area: Area, text: string, symmetric: boolean): PasteOutcome {
  const from: Place = { r: area.top, c: area.left };
  const [rows, columns] = [entries.length, entries[0]?.length ?? 0];
  const pasted = parsePasted(text, columns - from.c);
  const [height, width] = [pasted.entries.length, pasted.entries[0]?.length ?? 0];
  if (height === 0) return { entries, doubts: [], area, said: "There was nothing to paste." };
  if (height === 1 && width === 1) {
    const entry = pasted.entries[0][0];
    const said = area.top === area.bottom && area.left === area.right ? "Pasted." : "Pasted into every selected cell.";
    const doubts = pasted.problems.map(({ message }) => ({ ...from, entry, message }));
    return { entries: fill(entries, area, entry, symmetric), doubts, area, said };
  }
  const { entries: next, outside } = writeBlock(entries, from, pasted.entries, symmetric);
  const doubts = pasted.problems.map(({ row, column, message }) => ({
    r: from.r + row,
    c: from.c + column,
    entry: pasted.entries[row][column],
    message,
  }));
  const corner: Place = { r: Math.min(from.r + height, rows) - 1, c: Math.min(from.c + width, columns) - 1 };
  const left = outside > 0 ? ` ${outside} of its entries fell outside the grid and were left out.` : "";
  const marked = doubts.length > 0 ? ` ${doubts.length} could not be read with certainty; they are marked.` : "";
  const said = `Pasted ${height} × ${width} entries at row ${from.r + 1}, column ${from.c + 1}.${left}${marked}`;
  return { entries: next, doubts, area: areaOf(from, corner), said };
}
