/** "m²", "(m/s)²": what a weight or a variance is counted in. */
export function squaredUnit(unit: string): string {
  return /^[^\s/·*^()²³]+$/.test(unit) ? `${unit}²` : `(${unit})²`;
}

/** Unit of an entry of a weight matrix: what one over the product of its two signals is counted in. */
export function weightUnit(row: string, column: string): string {
  return row === column ? `1/${squaredUnit(row)}` : `1/(${row}·${column})`;
}

/** Unit of an entry of a noise matrix; a density is counted per hertz, that is times seconds. */
export function noiseUnit(row: string, column: string, of: "rate" | "value", sampled: boolean): string {
  const product = row === column ? squaredUnit(row) : `${row}·${column}`;
  if (sampled) return product;
  return of === "rate" ? `${product}/s` : `${product}·s`;
}

/** Unit of an entry of a gain: what its row has, for one of what its column has. */
export function gainUnit(row: string | undefined, column: string | undefined): string {
  if (!row || !column) return row || (column ? `1/${column}` : "1");
  return row === column ? "1" : `${row} per ${column}`;
}
