import { pythagoras } from "../linalg/flat";

/** I - beta v v', with v acting on indices first … first + v.length - 1. */
export type Reflection = { readonly first: number; readonly v: Float64Array; readonly beta: number };

/** The reflection that maps the vector x onto a multiple of its first entry, or null when nothing is to be done. */
export function reflectionOf(x: Float64Array, first: number): Reflection | null {
  let length = 0;
  let rest = 0;
  for (let i = 0; i < x.length; i++) {
    length = pythagoras(length, x[i]);
    if (i > 0) rest = Math.max(rest, Math.abs(x[i]));
  }
  if (rest === 0) return null;
  const v = x.map((entry) => entry / length);
  v[0] += v[0] >= 0 ? 1 : -1;
  let square = 0;
  for (const entry of v) square += entry * entry;
  return { first, v, beta: 2 / square };
}

/** x ← (I - beta v v') x for the columns from `from` on. */
export function reflectRows(x: Float64Array, columns: number, { first, v, beta }: Reflection, from = 0): void {
  const sums = new Float64Array(columns);
  for (let i = 0; i < v.length; i++) {
    const row = (first + i) * columns;
    for (let j = from; j < columns; j++) sums[j] += v[i] * x[row + j];
  }
  for (let i = 0; i < v.length; i++) {
    const row = (first + i) * columns;
    const factor = beta * v[i];
    for (let j = from; j < columns; j++) x[row + j] -= factor * sums[j];
  }
}

/** x ← x (I - beta v v'). */
export function reflectColumns(x: Float64Array, columns: number, { first, v, beta }: Reflection): void {
  const rows = columns === 0 ? 0 : x.length / columns;
  for (let i = 0; i < rows; i++) {
    const at = i * columns + first;
    let sum = 0;
    for (let j = 0; j < v.length; j++) sum += v[j] * x[at + j];
    sum *= beta;
    for (let j = 0; j < v.length; j++) x[at + j] -= sum * v[j];
  }
}
