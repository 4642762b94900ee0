import { fromFlat, largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { singularValues } from "../linalg/singular-values";
import { type Reflection, reflectionOf, reflectRows } from "./reflections";

export type RowCompression = {
  readonly rank: number;
  /** Largest first, of the whole block. */
  readonly singularValues: readonly number[];
  /** Applied in this order to its rows they leave a block whose rows from `rank` on are zero within the tolerance. */
  readonly reflections: readonly Reflection[];
};

const FLOOR = powerOfTwo(-500);

/**
 * Orthogonal compression of a block onto its first rows, with its rank decided on singular values.
 *
 * Shapes    x rows×columns row-major, left as it is; reflections count from row `first`
 * Accuracy  singular values within a few ε of the largest; rows beyond the rank are within a small multiple of the tolerance
 * Source    Businger & Golub, Numer. Math. 7 (1965) 269-276: QR with column pivoting
 */
export function compressRows(x: Float64Array, rows: number, columns: number, tolerance: number, first: number): RowCompression {
  const steps = Math.min(rows, columns);
  if (steps === 0) return { rank: 0, singularValues: [], reflections: [] };
  const factor = powerOfTwo(-exponentOf(largestEntry(x) || 1));
  // The block now has the size of 1; squares of anything below the floor would underflow.
  const r = x.map((entry) => (Math.abs(entry * factor) < FLOOR ? 0 : entry * factor));
  const found: (Reflection | null)[] = [];
  for (let step = 0; step < steps; step++) {
    swapColumns(r, columns, step, largestColumn(r, rows, columns, step));
    const below = new Float64Array(rows - step);
    for (let i = step; i < rows; i++) below[i - step] = r[i * columns + step];
    const reflection = reflectionOf(below, step);
    if (reflection) reflectRows(r, columns, reflection, step);
    for (let i = step + 1; i < rows; i++) r[i * columns + step] = 0;
    found.push(reflection);
  }
  const values = singularValues(fromFlat(r, steps, columns)).map((value) => value / factor);
  const rank = values.filter((value) => value > tolerance).length;
  const reflections = found.slice(0, rank).flatMap((one) => (one ? [{ ...one, first: one.first + first }] : []));
  return { rank, singularValues: values, reflections };
}

function largestColumn(r: Float64Array, rows: number, columns: number, step: number): number {
  let best = step;
  let largest = -1;
  for (let j = step; j < columns; j++) {
    let square = 0;
    for (let i = step; i < rows; i++) square += r[i * columns + j] * r[i * columns + j];
    if (square > largest) {
      largest = square;
      best = j;
    }
  }
  return best;
}

function swapColumns(r: Float64Array, columns: number, a: number, b: number): void {
  if (a === b) return;
  for (let at = 0; at < r.length; at += columns) {
    const kept = r[at + a];
    r[at + a] = r[at + b];
    r[at + b] = kept;
  }
}
