import { type Exact, exactly, toDouble } from "./exact-matrix";

/** Coefficients of det(zI - M) for a matrix of whole numbers, leading one first (Faddeev & LeVerrier). */
export function characteristic(M: readonly (readonly bigint[])[]): bigint[] {
  const n = M.length;
  const coefficients = [1n];
  let N: bigint[][] = M.map((row) => row.map(() => 0n));
  for (let k = 1; k <= n; k++) {
    for (let i = 0; i < n; i++) N[i][i] += coefficients[k - 1];
    N = M.map((row) => N[0].map((_, j) => row.reduce((sum, x, l) => (x === 0n ? sum : sum + x * N[l][j]), 0n)));
    coefficients.push(-N.reduce((trace, row, i) => trace + row[i], 0n) / BigInt(k));
  }
  return coefficients;
}

type ExactComplex = { readonly re: bigint; readonly im: bigint };

/**
 * How far the eigenvalue nearest to each value lies from it: one Newton step on the exact characteristic polynomial of M,
 * which is right to first order for simple eigenvalues.
 */
export function eigenvalueErrors(M: Exact, values: readonly { readonly re: number; readonly im: number }[]): number[] {
  const polynomial = characteristic(M.rows);
  return values.map(({ re, im }) => {
    const { rows, exponent } = exactly([[re, im]]);
    const shared = Math.min(exponent, M.exponent);
    const z = { re: rows[0][0] << BigInt(exponent - shared), im: rows[0][1] << BigInt(exponent - shared) };
    return newtonStep(polynomial, z, M.exponent - shared, shared);
  });
}

/** |p(z) / p'(z)| where the matrix behind p stands 2^lift above the unit 2^unit of z. */
function newtonStep(polynomial: readonly bigint[], z: ExactComplex, lift: number, unit: number): number {
  let value: ExactComplex = { re: 0n, im: 0n };
  let slope: ExactComplex = { re: 0n, im: 0n };
  polynomial.forEach((coefficient, k) => {
    slope = added(multiplied(slope, z), value);
    value = added(multiplied(value, z), { re: coefficient << BigInt(lift * k), im: 0n });
  });
  const scale = Math.max(...[value, slope].flatMap(({ re, im }) => [re, im].map((x) => x.toString(2).length)));
  const size = ({ re, im }: ExactComplex) => Math.hypot(toDouble(re, -scale), toDouble(im, -scale));
  return size(value) === 0 ? 0 : (size(value) / size(slope)) * 2 ** unit;
}

const multiplied = (a: ExactComplex, b: ExactComplex) => ({ re: a.re * b.re - a.im * b.im, im: a.re * b.im + a.im * b.re });
const added = (a: ExactComplex, b: ExactComplex) => ({ re: a.re + b.re, im: a.im + b.im });
