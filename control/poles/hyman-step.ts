import type { Complex } from "../plant/model";
import { addMultiple, divideWide, negative, type WideRows, wideAt, wideZeros } from "./wide-rows";

/** A complex number with the rounding of either part kept beside it. */
export type WideComplex = Complex & { readonly reLow: number; readonly imLow: number };

/** Vectors x and dx/dz of Hyman's recurrence, real and imaginary parts, and the sums of columns times them. */
type Recurrence = {
  readonly z: WideComplex;
  readonly complex: boolean;
  readonly value: readonly [WideRows, WideRows];
  readonly slope: readonly [WideRows, WideRows];
};

/**
 * p'(z) / p(z) for the characteristic polynomial p of an upper Hessenberg matrix, null where p(z) is zero. Each block between
 * zero subdiagonal entries adds its own share.
 *
 * Shapes    columns: column j of the matrix from j n on, only entries i ≤ j + 1 are read
 * Units     1 over those of the matrix
 * Throws    nothing; NaN when the recurrence leaves the range of numbers
 * Accuracy  that of the 32 digits carried: exact for a matrix within n 1e-32 of the given one
 * Source    Hyman 1957, in Wilkinson, The Algebraic Eigenvalue Problem, 1965, section 7.11
 */
export function logarithmicDerivative(columns: WideRows, n: number, z: WideComplex): Complex | null {
  let re = 0;
  let im = 0;
  for (let to = n; to > 0; ) {
    let from = to - 1;
    while (from > 0 && columns.hi[(from - 1) * n + from] !== 0) from--;
    const share = blockShare(columns, n, from, to, z);
    if (share === null) return null;
    re += share.re;
    im += share.im;
    to = from;
  }
  return { re, im };
}

function blockShare(columns: WideRows, n: number, from: number, to: number, z: WideComplex): Complex | null {
  const size = to - from;
  const run: Recurrence = {
    z,
    complex: z.im !== 0 || z.imLow !== 0,
    value: [wideZeros(size), wideZeros(size)],
    slope: [wideZeros(size), wideZeros(size)],
  };
  const x = [wideZeros(1), wideZeros(1)];
  const d = [wideZeros(1), wideZeros(1)];
  x[0].hi[0] = 1;
  for (let j = to - 1; j >= from; j--) {
    addColumn(run, columns, j * n + from, j - from, x, d);
    if (j === from) break;
    const below = negative(wideAt(columns, (j - 1) * n + j));
    for (const part of [0, 1]) {
      setQuotient(x[part], run.value[part], j - from, below);
      setQuotient(d[part], run.slope[part], j - from, below);
    }
  }
  return quotient(run.slope, run.value);
}

/** Adds column (A - z I)ⱼ xⱼ to the sums of values and its derivative to those of slopes, rows 0 to j. */
function addColumn(
  { z, complex, value, slope }: Recurrence,
  columns: WideRows,
  at: number,
  j: number,
  x: WideRows[],
  d: WideRows[],
) {
  const parts = complex ? [0, 1] : [0];
  for (const part of parts) {
    addMultiple(value[part], 0, columns, at, j + 1, 1, wideAt(x[part], 0));
    addMultiple(slope[part], 0, columns, at, j + 1, 1, wideAt(d[part], 0));
    addMultiple(slope[part], j, x[part], 0, 1, 1, { hi: -1, lo: 0 });
  }
  subtractProduct(value, j, x, z, complex);
  subtractProduct(slope, j, d, z, complex);
}

/** sums[j] -= z x */
function subtractProduct(sums: readonly WideRows[], j: number, x: WideRows[], z: WideComplex, complex: boolean): void {
  const minusRe = { hi: -z.re, lo: -z.reLow };
  addMultiple(sums[0], j, x[0], 0, 1, 1, minusRe);
  if (!complex) return;
  addMultiple(sums[0], j, x[1], 0, 1, 1, { hi: z.im, lo: z.imLow });
  addMultiple(sums[1], j, x[1], 0, 1, 1, minusRe);
  addMultiple(sums[1], j, x[0], 0, 1, 1, { hi: -z.im, lo: -z.imLow });
}

function setQuotient(target: WideRows, sums: WideRows, j: number, divisor: { hi: number; lo: number }): void {
  const { hi, lo } = sums.hi[j] === 0 ? { hi: 0, lo: 0 } : divideWide(wideAt(sums, j), divisor);
  target.hi[0] = hi;
  target.lo[0] = lo;
}

/** slope / value in the first row of the block, where the sums are the determinant up to a constant. */
function quotient([upRe, upIm]: readonly WideRows[], [downRe, downIm]: readonly WideRows[]): Complex | null {
  const size = Math.max(Math.abs(downRe.hi[0]), Math.abs(downIm.hi[0]));
  if (size === 0) return null;
  const x = downRe.hi[0] / size;
  const y = downIm.hi[0] / size;
  const square = x * x + y * y;
  const u = upRe.hi[0] / size;
  const v = upIm.hi[0] / size;
  return { re: (u * x + v * y) / square, im: (v * x - u * y) / square };
}
