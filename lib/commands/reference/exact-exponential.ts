import type { Matrix } from "ml-matrix";
import { type Exact, exactly } from "./exact-matrix";

/** Bits behind the point: far beyond what squaring can lose here. */
export const FRACTION = 400;
const TERMS = 60;
/** Scaled below 2^-8, sixty terms of the series leave less than the last bit. */
const SQUARINGS = 8;

type Fixed = bigint[][];

const rescaled = (x: bigint) => x >> BigInt(FRACTION);

export function fixedProduct(a: Fixed, b: Fixed): Fixed {
  return a.map((row) => (b[0] ?? []).map((_, j) => rescaled(row.reduce((sum, x, l) => sum + x * b[l][j], 0n))));
}

/** Whole numbers in units of 2^-FRACTION. */
function toFixed({ rows, exponent }: Exact): Fixed {
  const shift = exponent + FRACTION;
  return rows.map((row) => row.map((x) => (shift >= 0 ? x << BigInt(shift) : x >> BigInt(-shift))));
}

export const fixed = (M: Parameters<typeof exactly>[0]): Fixed => toFixed(exactly(M));

export function fixedDifference(a: Fixed, b: Matrix): number[] {
  const other = fixed(b);
  return a.flatMap((row, i) => row.map((x, j) => Number((x - other[i][j]) >> BigInt(FRACTION - 200)) / 2 ** 200));
}

/** exp(M) to about a hundred digits by its series and squaring in whole numbers; for norms up to a few hundred. */
export function exactExponential(M: Matrix): Fixed {
  const n = M.rows;
  const larger = Math.max(0, Math.ceil(Math.log2(M.norm() || 1)));
  const times = SQUARINGS + larger;
  const small = fixed(M).map((row) => row.map((x) => x >> BigInt(times)));
  const one = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => (i === j ? 1n << BigInt(FRACTION) : 0n)));
  let sum = one;
  let term = one;
  for (let k = 1; k <= TERMS; k++) {
    term = fixedProduct(term, small).map((row) => row.map((x) => x / BigInt(k)));
    sum = sum.map((row, i) => row.map((x, j) => x + term[i][j]));
  }
  for (let k = 0; k < times; k++) sum = fixedProduct(sum, sum);
  return sum;
}
