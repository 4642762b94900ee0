import "server-only";

/** Documents are some ten levels deep; whatever goes beyond is none of ours. */
const DEEPEST = 20;

/**
 * The last look before numbers are stored for good. The core refuses on its own, so this throws a fault of ours, and nothing
 * is stored: as JSON a NaN would quietly become null.
 */
export function requireFinite(value: unknown, depth = 0): void {
  if (depth > DEEPEST) throw new Error("A computed document is deeper than any of ours.");
  if (typeof value === "number" && !Number.isFinite(value)) throw new Error("A computed number is not finite.");
  if (typeof value !== "object" || value === null) return;
  if (value instanceof Float64Array) {
    if (!value.every(Number.isFinite)) throw new Error("A computed sample is not finite.");
    return;
  }
  for (const inner of Object.values(value)) requireFinite(inner, depth + 1);
}
