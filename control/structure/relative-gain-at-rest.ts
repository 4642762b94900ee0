import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat, toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import type { TimeBase } from "../plant/model";
import { assignLeast } from "./assign-least";
import { balanceSystem } from "./balance-system";
import { type GainTerm, gainSeries } from "./gain-series";
import { relativeGainArray } from "./relative-gain-array";

/** `array` null where the relative gains have no limit at rest; `limit` where gains at rest themselves are none or singular. */
export type RelativeGainAtRest = { readonly array: Matrix | null; readonly limit: boolean };

/** Order of an entry that is zero to every power. */
const NEVER = 1e6;

/**
 * Relative gain array at rest. Where the plant integrates, or where some gain vanishes at rest, it is the limit from low
 * frequencies: rows and columns are divided by the powers of s that leave the gains finite and not zero, which does not change
 * relative gains, and the array of what is left is taken.
 *
 * Shapes    A n×n, B n×m, H m×n, J m×m → m×m
 * Units     none
 * Throws    shape-mismatch; not-finite; too-large; no-convergence
 * Accuracy  that of `relativeGainArray`; null where the leading gains cancel: relative gains then grow without bound, or hang
 *           on what is smaller
 * Source    Bristol, IEEE Trans. Automatic Control 11 (1966) 133-134; Arkun & Downs, Computers & Chem. Eng. 14 (1990) 1093-1106,
 *           for integrating plants (from memory)
 */
export function relativeGainAtRest(A: Matrix, B: Matrix, H: Matrix, J: Matrix, timeBase: TimeBase): RelativeGainAtRest {
  requireSquare("A", A);
  requireSquare("J", J);
  requireShape("B", B, A.rows, J.rows);
  requireShape("H", H, J.rows, A.rows);
  for (const [name, M] of Object.entries({ A, B, H, J })) requireFinite(name, M);
  const terms = seriesAtRest(A, B, H, J, timeBase);
  const size = J.rows;
  const orders = Array.from({ length: size }, (_, i) => Array.from({ length: size }, (_, j) => orderOf(terms, i, j)));
  const { rows, columns } = assignLeast(orders);
  const leading = Matrix.zeros(size, size);
  orders.forEach((row, i) => {
    row.forEach((order, j) => {
      if (order >= NEVER || order !== rows[i] + columns[j]) return;
      leading.set(i, j, terms.find(({ power }) => power === order)?.value.get(i, j) ?? 0);
    });
  });
  const limit = orders.some((row) => row.some((order) => order < 0)) || [...rows, ...columns].some((power) => power !== 0);
  try {
    return { array: relativeGainArray(leading), limit };
  } catch (error) {
    if (error instanceof NumericalError && (error.code === "singular" || error.code === "too-large"))
      return { array: null, limit };
    throw error;
  }
}

/** About z = 1, in s = z - 1, when sampled. Balanced: units of signals and of time change neither relative gains nor powers. */
function seriesAtRest(A: Matrix, B: Matrix, H: Matrix, J: Matrix, timeBase: TimeBase): GainTerm[] {
  const n = A.rows;
  const about = timeBase.kind === "continuous" ? A : Matrix.sub(A, Matrix.eye(n));
  const fastest = eigenvalues(about).reduce((size, pole) => Math.max(size, modulus(pole)), 0);
  const system = { n, m: B.columns, p: H.rows, a: toFlat(about), b: toFlat(B), c: toFlat(H), d: toFlat(J) };
  const { a, b, c, d, m, p } = balanceSystem(system, fastest);
  return gainSeries(fromFlat(a, n, n), fromFlat(b, n, m), fromFlat(c, p, n), fromFlat(d, p, m));
}

/** The lowest power of s with a coefficient that is not rounding. */
function orderOf(terms: readonly GainTerm[], i: number, j: number): number {
  return terms.find(({ value, noise }) => Math.abs(value.get(i, j)) > noise.get(i, j))?.power ?? NEVER;
}
