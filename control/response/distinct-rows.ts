import { workArray } from "../linalg/work-array";
import type { LoopDynamics } from "./loop-dynamics";

/** Signals that are the same by definition, such as an output that is also commanded, stand once. */
export type DistinctRows = {
  /** Places of the distinct signals among all signals of the loop. */
  readonly places: readonly number[];
  /** For each row asked about: which of `places` it is. */
  readonly of: readonly number[];
  /** Their rows, places.length×order */
  readonly rows: Float64Array;
};

export function distinctRows(dynamics: LoopDynamics, wanted: readonly number[]): DistinctRows {
  const { c, order } = dynamics;
  const places: number[] = [];
  const of = wanted.map((row) => {
    const known = places.findIndex((place) => isSameSignal(dynamics, place, row));
    return known >= 0 ? known : places.push(row) - 1;
  });
  const rows = workArray(places.length * order);
  places.forEach((place, i) => {
    rows.set(c.subarray(place * order, (place + 1) * order), i * order);
  });
  return { places, of, rows };
}

function isSameSignal({ c, d, order, loop }: LoopDynamics, one: number, other: number): boolean {
  for (let k = 0; k < order; k++) if (c[one * order + k] !== c[other * order + k]) return false;
  const { columns } = loop;
  for (let j = 0; j < columns; j++) if (d[one * columns + j] !== d[other * columns + j]) return false;
  return true;
}
