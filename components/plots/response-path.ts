import type { Range } from "./response-data";

/** Drawing units of a cell, fine enough for whole numbers; the picture is stretched to whatever room there is. */
export const CELL = { width: 2000, height: 800 } as const;

export const yOf = (value: number, { low, high }: Range) => ((high - value) / (high - low)) * CELL.height;

const MOST_POINTS = 240;

/** An SVG path through the samples. Of many, each stretch keeps its lowest and highest, so that no peak is lost. */
export function responsePath(values: ArrayLike<number>, range: Range, held = false): string {
  const count = values.length;
  const kept = count <= MOST_POINTS ? Array.from({ length: count }, (_, k) => k) : thin(values, count);
  const across = CELL.width / Math.max(1, count - 1);
  let path = "";
  for (const k of kept) {
    const value = values[k];
    if (!Number.isFinite(value)) continue;
    const x = Math.round(k * across);
    const y = Math.round(yOf(value, range));
    if (path === "") path = `M${x} ${y}`;
    else path += held ? `H${x}V${y}` : `L${x} ${y}`;
  }
  return path;
}

function thin(values: ArrayLike<number>, count: number): number[] {
  const kept = [0];
  const stretch = (2 * count) / MOST_POINTS;
  for (let from = 1; from < count; from += stretch) {
    const end = Math.min(count, Math.floor(from + stretch));
    let [lowest, highest] = [Math.floor(from), Math.floor(from)];
    for (let k = Math.floor(from); k < end; k++) {
      if (values[k] < values[lowest]) lowest = k;
      if (values[k] > values[highest]) highest = k;
    }
    kept.push(Math.min(lowest, highest));
    if (lowest !== highest) kept.push(Math.max(lowest, highest));
  }
  if (kept.at(-1) !== count - 1) kept.push(count - 1);
  return kept;
}
