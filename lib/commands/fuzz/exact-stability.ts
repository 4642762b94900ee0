import type { Matrix } from "ml-matrix";

/** mantissa · 2^exponent, exactly. */
type Dyadic = { readonly mantissa: bigint; readonly exponent: number };

const bits = new DataView(new ArrayBuffer(8));

function dyadic(x: number): Dyadic {
  bits.setFloat64(0, x);
  const word = bits.getBigUint64(0);
  const field = Number((word >> 52n) & 0x7ffn);
  const fraction = word & 0xfffffffffffffn;
  const size = field === 0 ? fraction : fraction | 0x10000000000000n;
  return { mantissa: word >> 63n ? -size : size, exponent: Math.max(field, 1) - 1075 };
}

/**
 * Whether A - B K, with its doubles taken as exact numbers, has every eigenvalue inside the stability boundary: characteristic
 * polynomial (Faddeev & LeVerrier) and Hurwitz determinants in whole numbers, no rounding anywhere. Shares nothing with the core.
 */
export function isExactlyStable(A: Matrix, B: Matrix, K: Matrix, sampled: boolean): boolean {
  const { entries, exponent } = closedLoop(A, B, K);
  const polynomial = characteristic(entries);
  return isHurwitz(sampled ? toHalfPlane(polynomial, -exponent) : polynomial);
}

/** Whole numbers M with A - B K = M · 2^exponent, exponent ≤ 0. */
function closedLoop(A: Matrix, B: Matrix, K: Matrix): { entries: bigint[][]; exponent: number } {
  const terms = A.to2DArray().map((row, i) =>
    row.map((a, j) => [
      dyadic(a),
      ...B.getRow(i).map((b, l) => {
        const [left, right] = [dyadic(b), dyadic(K.get(l, j))];
        return { mantissa: -left.mantissa * right.mantissa, exponent: left.exponent + right.exponent };
      }),
    ]),
  );
  const present = terms.flat(2).filter(({ mantissa }) => mantissa !== 0n);
  const exponent = present.reduce((least, term) => Math.min(least, term.exponent), 0);
  const shifted = ({ mantissa, exponent: own }: Dyadic) => (mantissa === 0n ? 0n : mantissa << BigInt(own - exponent));
  return { entries: terms.map((row) => row.map((sum) => sum.reduce((all, term) => all + shifted(term), 0n))), exponent };
}

/** Coefficients of det(zI - M), leading one first. */
function characteristic(M: bigint[][]): bigint[] {
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

/** (1 - s)^n p((1 + s)/(1 - s)) for the polynomial p whose roots are those given times 2^-shift: the disk becomes the half-plane. */
function toHalfPlane(scaled: bigint[], shift: number): bigint[] {
  const n = scaled.length - 1;
  const times = (a: bigint[], sign: bigint) => [...a, 0n].map((x, k) => sign * x + (k > 0 ? a[k - 1] : 0n));
  const power = (sign: bigint, count: number) => Array.from({ length: count }).reduce<bigint[]>((a) => times(a, sign), [1n]);
  const sum = Array<bigint>(n + 1).fill(0n);
  scaled.forEach((coefficient, k) => {
    const weight = coefficient << BigInt(shift * (n - k));
    const [up, down] = [power(1n, n - k), power(-1n, k)];
    up.forEach((u, i) => {
      down.forEach((d, j) => {
        sum[i + j] += weight * u * d;
      });
    });
  });
  return sum[0] < 0n ? sum.map((x) => -x) : sum;
}

/** Leading Hurwitz determinants, which are the pivots of elimination without fractions (Bareiss), are all positive. */
function isHurwitz(coefficients: bigint[]): boolean {
  const n = coefficients.length - 1;
  if (coefficients.some((x) => x <= 0n)) return false;
  const rows = Array.from({ length: n }, (_, i) => Array.from({ length: n }, (__, j) => coefficients[2 * j + 1 - i] ?? 0n));
  let previous = 1n;
  for (let k = 0; k < n; k++) {
    if (rows[k][k] <= 0n) return false;
    for (let i = k + 1; i < n; i++)
      for (let j = k + 1; j < n; j++) rows[i][j] = (rows[k][k] * rows[i][j] - rows[i][k] * rows[k][j]) / previous;
    previous = rows[k][k];
  }
  return true;
}
