/** Pure edits of a grid of expression texts. */
export type Entries = readonly (readonly string[])[];
export type Place = { readonly r: number; readonly c: number };
/** Corners included, `top <= bottom`, `left <= right`. */
export type Area = { readonly top: number; readonly left: number; readonly bottom: number; readonly right: number };

export const EMPTY_ENTRY = "0";

export const areaOf = (a: Place, b: Place): Area => ({
  top: Math.min(a.r, b.r),
  left: Math.min(a.c, b.c),
  bottom: Math.max(a.r, b.r),
  right: Math.max(a.c, b.c),
});

export const holds = (area: Area, r: number, c: number) => r >= area.top && r <= area.bottom && c >= area.left && c <= area.right;

export const cut = (entries: Entries, area: Area): Entries =>
  entries.slice(area.top, area.bottom + 1).map((row) => row.slice(area.left, area.right + 1));

/**
 * Writes a block of texts with its first cell at `at`; what falls outside is left out and counted. In symmetric mode each entry
 * is mirrored, except where the block itself says what the mirrored cell holds.
 */
export function writeBlock(
  entries: Entries,
  at: Place,
  block: Entries,
  symmetric = false,
): { entries: Entries; outside: number } {
  const height = entries.length;
  const width = entries[0]?.length ?? 0;
  const next = entries.map((row) => [...row]);
  const last = { r: at.r + block.length - 1, c: at.c + (block[0]?.length ?? 0) - 1 };
  const area = areaOf(at, last);
  let outside = 0;
  for (const [i, row] of block.entries()) {
    for (const [j, text] of row.entries()) {
      const [r, c] = [at.r + i, at.c + j];
      if (r >= height || c >= width) {
        outside += 1;
        continue;
      }
      next[r][c] = text;
      if (symmetric && r !== c && c < height && r < width && !holds(area, c, r)) next[c][r] = text;
    }
  }
  return { entries: sameEntries(entries, next) ? entries : next, outside };
}

/** Fills an area with one text; clearing fills with zero. */
export function fill(entries: Entries, area: Area, text: string, symmetric = false): Entries {
  const block = Array.from({ length: area.bottom - area.top + 1 }, () =>
    Array.from({ length: area.right - area.left + 1 }, () => text),
  );
  return writeBlock(entries, { r: area.top, c: area.left }, block, symmetric).entries;
}

export const sameEntries = (a: Entries, b: Entries) =>
  a === b ||
  (a.length === b.length && a.every((row, r) => row.length === b[r].length && row.every((text, c) => text === b[r][c])));
