import { exponentOf, powerOfTwo } from "../linalg/power-of-two";

/** A state's unit is moved by at most 2 to this power. */
export const MOST_EXPONENT = 400;

/**
 * One sweep of balancing over the states by powers of two; true while some state still moved. A state whose way in times
 * way out is at most `lost` keeps its unit: there it is rounding that would be blown up.
 *
 * Shapes    a n×n row-major and stateScale n, both overwritten; only `members` may move
 * Source    Parlett & Reinsch, Numer. Math. 13 (1969) 293-304
 */
export function balanceStates(
  a: Float64Array,
  n: number,
  stateScale: Float64Array,
  lost: number,
  members: readonly number[],
): boolean {
  let moved = false;
  for (const i of members) {
    let row = 0;
    let column = 0;
    for (let j = 0; j < n; j++) {
      if (j === i) continue;
      row += Math.abs(a[i * n + j]);
      column += Math.abs(a[j * n + i]);
    }
    if (row === 0 || column === 0 || row * column <= lost) continue;
    const half = Math.round((exponentOf(row) - exponentOf(column)) / 2);
    if (half === 0 || Math.abs(exponentOf(stateScale[i]) + half) > MOST_EXPONENT) continue;
    const f = powerOfTwo(half);
    if (column * f + row / f >= 0.95 * (column + row)) continue;
    moved = true;
    stateScale[i] *= f;
    for (let j = 0; j < n; j++) a[i * n + j] /= f;
    for (let j = 0; j < n; j++) a[j * n + i] *= f;
  }
  return moved;
}
