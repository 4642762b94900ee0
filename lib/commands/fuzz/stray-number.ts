import { Matrix } from "ml-matrix";

/** Where a number that is none stands inside a result, at any depth; null when there is none. */
export function strayNumber(value: unknown, path = ""): string | null {
  if (typeof value === "number") return Number.isFinite(value) ? null : path || "/";
  if (typeof value !== "object" || value === null) return null;
  if (Matrix.isMatrix(value)) return strayNumber((value as Matrix).to1DArray(), path);
  if (ArrayBuffer.isView(value)) {
    const at = Array.prototype.findIndex.call(value, (x) => typeof x === "number" && !Number.isFinite(x));
    return at < 0 ? null : `${path}/${at}`;
  }
  for (const [key, inner] of Object.entries(value)) {
    const found = strayNumber(inner, `${path}/${key}`);
    if (found !== null) return found;
  }
  return null;
}
