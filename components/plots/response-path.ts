import type { Range } from "./response-data";

/** Drawing units of a cell; the picture is stretched to whatever room there is. */
export const CELL = { width: 1000, height: 400 } as const;

export const yOf = (value: number, { low, high }: Range) => ((high - value) / (high - low)) * CELL.height;

const MOST_POINTS = 480;

/** An SVG path through the samples. Of many, each stretch keeps its lowest and highest, so that no peak is lost. */
export function responsePath(values: ArrayLike<number>, range: Range, held = false): string {
  const count = values.length;
  const kept = count <= MOST_POINTS ? Array.from({ length: count }, (_, k) => k) : thin(values, count);
  const x = (k: number) => ((k / Math.max(1, count - 1)) * CELL.width).toFixed(1);
  let path = "";
  for (const k of kept) {
    const value = values[k];
    if (!Number.isFinite(value)) continue;
    const y = yOf(value, range).toFixed(1);
    if (path === "") path = `M${x(k)} ${y}`;
    else path += held ? `H${x(k)}V${y}` : `L${x(k)} ${y}`;
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
