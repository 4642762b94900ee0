import type { Range, ResponseRow } from "./response-data";

const MARGIN = 0.08;
/** A limit further away than this many times what the curves reach is named, not drawn: it would flatten them. */
const LIMIT_REACH = 4;

const extents = new WeakMap<ResponseRow, Range>();

/** Asked for by scale, limits and words alike, so it is found once for each row. */
function extent(row: ResponseRow): Range {
  const known = extents.get(row);
  if (known) return known;
  const found = measuredExtent(row);
  extents.set(row, found);
  return found;
}

function measuredExtent(row: ResponseRow): Range {
  let low = 0;
  let high = 0;
  const take = (value: number | null | undefined) => {
    if (value === null || value === undefined || !Number.isFinite(value)) return;
    low = Math.min(low, value);
    high = Math.max(high, value);
  };
  for (const cell of row.cells) {
    if (!cell) continue;
    take(cell.final);
    for (const line of [cell.values, cell.estimated, cell.fullState, cell.ghost]) {
      for (let k = 0; k < (line?.length ?? 0); k++) take(line?.[k]);
    }
  }
  return { low, high };
}

/** Limits near enough to be drawn with the curves. */
export function drawnLimits(row: ResponseRow): readonly number[] {
  const { low, high } = extent(row);
  const reach = LIMIT_REACH * Math.max(high, -low);
  return [row.limits?.lower, row.limits?.upper].filter(
    (limit): limit is number => limit !== null && limit !== undefined && Math.abs(limit) <= reach,
  );
}

/** The scale shared by a row: zero, every curve, the values at rest and the limits that are drawn. Never empty. */
export function rowRange(row: ResponseRow): Range {
  const { low, high } = extent(row);
  const limits = drawnLimits(row);
  const bottom = Math.min(low, ...limits);
  const top = Math.max(high, ...limits);
  const span = top - bottom || 1;
  return { low: bottom - MARGIN * span, high: top + MARGIN * span };
}
