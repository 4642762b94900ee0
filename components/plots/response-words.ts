import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { ResponseCell, ResponseColumn, ResponseRow } from "./response-data";
import { drawnLimits } from "./response-scale";

/** What stands in the corner of a cell. */
export function cellCaption(cell: ResponseCell): string {
  if (cell.own && cell.final !== null) return formatNumber(cell.final);
  return cell.peak === null ? "" : `peak ${formatNumber(cell.peak)}`;
}

/** One cell in a sentence: at rest, peak and when, settling, limit. */
export function cellSentence(row: ResponseRow, column: ResponseColumn, cell: ResponseCell): string {
  const parts: string[] = [];
  if (cell.peak !== null) {
    const when = cell.peakAt === null ? "" : ` at ${formatSeconds(cell.peakAt)}`;
    parts.push(`peak ${formatNumber(cell.peak)} ${row.unit}${when}`);
  }
  if (cell.final !== null) parts.push(`${formatNumber(cell.final)} ${row.unit} at rest`);
  if (cell.settling !== null && cell.settling !== undefined) parts.push(`settled after ${formatSeconds(cell.settling)}`);
  const beyond = beyondLimit(row, cell);
  if (beyond) parts.push(beyond);
  return `${column.label}: ${row.label} ${parts.join(", ") || "has no figures"}.`;
}

/** Whether an input would be driven beyond its limit. */
export function beyondLimit(row: ResponseRow, cell: ResponseCell): string | null {
  if (!row.limits || cell.peak === null) return null;
  const limit = cell.peak < 0 ? row.limits.lower : row.limits.upper;
  if (limit === null) return null;
  return Math.abs(cell.peak) > Math.abs(limit)
    ? `beyond its limit of ${formatNumber(limit)} ${row.unit}`
    : `within its limit of ${formatNumber(limit)} ${row.unit}`;
}

/** Said beside a row whose limits lie far outside the picture. */
export function farLimits(row: ResponseRow): string | null {
  if (!row.limits) return null;
  const drawn = drawnLimits(row);
  const far = [row.limits.lower, row.limits.upper].filter((limit): limit is number => limit !== null && !drawn.includes(limit));
  return far.length === 0 ? null : `limit ${far.map((limit) => formatNumber(limit)).join(", ")} off scale`;
}
