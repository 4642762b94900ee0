import type { Matrix } from "ml-matrix";
import { exactly, plus, times } from "../reference/exact-matrix";
import { characteristic } from "../reference/exact-polynomial";

/**
 * Whether A - B K, with its doubles taken as exact numbers, has every eigenvalue inside the stability boundary: characteristic
 * polynomial (Faddeev & LeVerrier) and Hurwitz determinants in whole numbers, no rounding anywhere. Shares nothing with the core.
 */
export function isExactlyStable(A: Matrix, B: Matrix, K: Matrix, sampled: boolean): boolean {
  const { rows, exponent } = plus(exactly(A), times(exactly(B), exactly(K)), -1);
  // Whole numbers in units of at most one, so that the bilinear map stays among them.
  const lift = BigInt(Math.max(0, exponent));
  const polynomial = characteristic(rows.map((row) => row.map((x) => x << lift)));
  return isHurwitz(sampled ? toHalfPlane(polynomial, Math.max(0, -exponent)) : polynomial);
}

/** (1 - s)^n p((1 + s)/(1 - s)) for the polynomial p whose roots are those given times 2^-shift: the disk becomes the half-plane. */
function toHalfPlane(scaled: bigint[], shift: number): bigint[] {
  const n = scaled.length - 1;
  const byFactor = (a: bigint[], sign: bigint) => [...a, 0n].map((x, k) => sign * x + (k > 0 ? a[k - 1] : 0n));
  const power = (sign: bigint, count: number) => Array.from({ length: count }).reduce<bigint[]>((a) => byFactor(a, sign), [1n]);
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
