import type { CompareCell, CompareRow, CompareSection } from "./compare-types";

export type Mark = { readonly differs: boolean; readonly standing: "best" | "last" | null };

const sameCell = (a: CompareCell | null, b: CompareCell | null) => a?.exact === b?.exact;

/** Whether every design has the same. */
export const isEqualRow = ({ cells }: CompareRow): boolean => cells.every((cell) => sameCell(cell, cells[0]));

/**
 * What is marked in a row: a cell differs when it is not the first design's; best and last are the ends of the ranking as the
 * figures are shown, and nobody stands out where all are alike.
 */
export function marksOf({ cells }: CompareRow): Mark[] {
  const ranked = cells.flatMap((cell) => (cell && typeof cell.rank === "number" ? [{ text: cell.text, rank: cell.rank }] : []));
  const [first] = ranked;
  const least = ranked.reduce((best, one) => (one.rank < best.rank ? one : best), first);
  const most = ranked.reduce((last, one) => (one.rank > last.rank ? one : last), first);
  const apart = ranked.length > 1 && least.text !== most.text;
  return cells.map((cell) => ({
    differs: !sameCell(cell, cells[0]),
    standing:
      !apart || typeof cell?.rank !== "number"
        ? null
        : cell.text === least.text
          ? "best"
          : cell.text === most.text
            ? "last"
            : null,
  }));
}

/** Sections without the rows in which all designs are alike, and without those that then are empty. */
export function onlyDifferences(sections: readonly CompareSection[]): CompareSection[] {
  return sections.flatMap((section) => {
    const rows = section.rows.filter((row) => !isEqualRow(row));
    return rows.length > 0 ? [{ ...section, rows }] : [];
  });
}

/** Signals of several designs, each name once, in the order in which they are first met. */
export function unionByName<T extends { readonly name: string }>(lists: readonly (readonly T[])[]): T[] {
  const seen = new Map<string, T>();
  for (const list of lists) for (const signal of list) if (!seen.has(signal.name)) seen.set(signal.name, signal);
  return [...seen.values()];
}
