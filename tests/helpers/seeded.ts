import { Matrix } from "ml-matrix";

/** Uniform numbers in [0, 1) from a seed (mulberry32), so that a failing case can be run again. */
export function seededUniform(seed: number): () => number {
  let state = seed >>> 0;
  return () => {
    state = (state + 0x6d2b79f5) >>> 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/** Entries uniform in [-1, 1). */
export function seededMatrix(random: () => number, rows: number, columns: number): Matrix {
  return new Matrix(Array.from({ length: rows }, () => Array.from({ length: columns }, () => 2 * random() - 1)));
}
