import type { WideNumber } from "../linalg/wide-number";
import type { Complex } from "../plant/model";
import { addMultiple, divideWide, type WideRows, wideAt, wideZeros } from "./wide-rows";

/** A complex number with the rounding of either part kept beside it. */
export type WideComplex = Complex & { readonly reLow: number; readonly imLow: number };

/**
 * An upper Hessenberg matrix made ready for Hyman's recurrence, and room for it: vectors x and dx/dz, real and imaginary parts,
 * and the sums of columns times them.
 */
export type HymanMatrix = {
  readonly n: number;
  /** Column j from j n on; entries below i = j + 1 are never read. */
  readonly columns: WideRows;
  /** -1 / h[j, j-1], zero where a block begins. */
  readonly steps: readonly WideNumber[];
  readonly sums: { readonly value: readonly [WideRows, WideRows]; readonly slope: readonly [WideRows, WideRows] };
  readonly x: readonly [WideRows, WideRows];
  readonly d: readonly [WideRows, WideRows];
};

export function prepareHyman({ hi, lo }: WideRows, n: number): HymanMatrix {
  const columns = wideZeros(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = Math.max(0, i - 1); j < n; j++) {
      columns.hi[j * n + i] = hi[i * n + j];
      columns.lo[j * n + i] = lo[i * n + j];
    }
  }
  const steps = Array.from({ length: n }, (_, j) => {
    const below = j === 0 ? { hi: 0, lo: 0 } : wideAt(columns, (j - 1) * n + j);
    return below.hi === 0 ? { hi: 0, lo: 0 } : divideWide({ hi: -1, lo: 0 }, below);
  });
  return {
    n,
    columns,
    steps,
    sums: { value: [wideZeros(n), wideZeros(n)], slope: [wideZeros(n), wideZeros(n)] },
    x: [wideZeros(1), wideZeros(1)],
    d: [wideZeros(1), wideZeros(1)],
  };
}

/**
 * p'(z) / p(z) for the characteristic polynomial p of the matrix, null where p(z) is zero. Each block between zero subdiagonal
 * entries adds its own share.
 *
 * Shapes    n×n
 * Units     1 over those of the matrix
 * Throws    nothing; NaN when the recurrence leaves the range of numbers
 * Accuracy  that of the 32 digits carried: exact for a matrix within n 1e-31 of the given one
 * Source    Hyman 1957, in Wilkinson, The Algebraic Eigenvalue Problem, 1965, section 7.11
 */
export function logarithmicDerivative(matrix: HymanMatrix, z: WideComplex): Complex | null {
  let re = 0;
  let im = 0;
  for (let to = matrix.n; to > 0; ) {
    let from = to - 1;
    while (matrix.steps[from].hi !== 0) from--;
    const share = blockShare(matrix, from, to, z);
    if (share === null) return null;
    re += share.re;
    im += share.im;
    to = from;
  }
  return { re, im };
}

function blockShare(matrix: HymanMatrix, from: number, to: number, z: WideComplex): Complex | null {
  const { n, columns, steps, sums, x, d } = matrix;
  const { value, slope } = sums;
  const parts = z.im !== 0 || z.imLow !== 0 ? 2 : 1;
  for (let part = 0; part < 2; part++) {
    clear(value[part], to - from);
    clear(slope[part], to - from);
    setEntry(x[part], part === 0 ? 1 : 0, 0);
    setEntry(d[part], 0, 0);
  }
  for (let j = to - 1; j >= from; j--) {
    const at = j - from;
    for (let part = 0; part < parts; part++) {
      addMultiple(value[part], 0, columns, j * n + from, at + 1, 1, wideAt(x[part], 0));
      addMultiple(slope[part], 0, columns, j * n + from, at + 1, 1, wideAt(d[part], 0));
      addMultiple(slope[part], at, x[part], 0, 1, 1, { hi: -1, lo: 0 });
    }
    subtractProduct(value, at, x, z, parts);
    subtractProduct(slope, at, d, z, parts);
    if (j === from) break;
    for (let part = 0; part < parts; part++) {
      setEntry(x[part], 0, 0);
      addMultiple(x[part], 0, value[part], at, 1, 1, steps[j]);
      setEntry(d[part], 0, 0);
      addMultiple(d[part], 0, slope[part], at, 1, 1, steps[j]);
    }
  }
  return quotient(slope, value);
}

function clear({ hi, lo }: WideRows, count: number): void {
  for (let k = 0; k < count; k++) {
    hi[k] = 0;
    lo[k] = 0;
  }
}

function setEntry(x: WideRows, hi: number, lo: number): void {
  x.hi[0] = hi;
  x.lo[0] = lo;
}

/** sums[j] -= z x */
function subtractProduct(sums: readonly WideRows[], j: number, x: readonly WideRows[], z: WideComplex, parts: number): void {
  const minusRe = { hi: -z.re, lo: -z.reLow };
  addMultiple(sums[0], j, x[0], 0, 1, 1, minusRe);
  if (parts === 1) return;
  addMultiple(sums[0], j, x[1], 0, 1, 1, { hi: z.im, lo: z.imLow });
  addMultiple(sums[1], j, x[1], 0, 1, 1, minusRe);
  addMultiple(sums[1], j, x[0], 0, 1, 1, { hi: -z.im, lo: -z.imLow });
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
