const WIDTH = 96;

/** JSON for a reader: whatever fits stays on one line, so that a row of a matrix looks like a row. */
export function compactJson(value: unknown, indent = ""): string {
  const line = JSON.stringify(value) ?? "null";
  if (typeof value !== "object" || value === null || indent.length + line.length <= WIDTH) return spaced(value);
  const deeper = `${indent}  `;
  const parts = Array.isArray(value)
    ? value.map((item) => compactJson(item, deeper))
    : Object.entries(value).map(([name, item]) => `${JSON.stringify(name)}: ${compactJson(item, deeper)}`);
  const [open, close] = Array.isArray(value) ? ["[", "]"] : ["{", "}"];
  return `${open}\n${parts.map((part) => deeper + part).join(",\n")}\n${indent}${close}`;
}

/** One line with a blank after each comma and colon. */
function spaced(value: unknown): string {
  if (Array.isArray(value)) return `[${value.map(spaced).join(", ")}]`;
  if (typeof value !== "object" || value === null) return JSON.stringify(value) ?? "null";
  const parts = Object.entries(value).map(([name, item]) => `${JSON.stringify(name)}: ${spaced(item)}`);
  return parts.length > 0 ? `{ ${parts.join(", ")} }` : "{}";
}
