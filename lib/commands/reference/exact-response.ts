import type { Matrix } from "ml-matrix";
import { FRACTION, fixed, fixedProduct } from "./exact-exponential";

const one = 1n << BigInt(FRACTION);
const times = (a: bigint, b: bigint) => (a * b) >> BigInt(FRACTION);

const quotient = (a: bigint, b: bigint) => Number((a << 80n) / b) / 2 ** 80;

/**
 * C (iωI - A)⁻¹ B entry after entry, real and imaginary parts, to some hundred bits: the adjugate by powers of A over the
 * characteristic polynomial (Faddeev & LeVerrier), in fixed-point numbers.
 */
export function exactResponse(A: Matrix, B: Matrix, C: Matrix, frequency: number): number[] {
  const [a, b, c] = [A, B, C].map(fixed);
  const [[w]] = fixed([[frequency]]);
  const n = A.rows;
  // (iω)^k is ω^k times 1, i, -1 or -i: even and odd powers are summed apart.
  const powers = Array.from({ length: n + 1 }, (_, k) => Array.from({ length: k }).reduce<bigint>((p) => times(p, w), one));
  const turned = (k: number) => (k % 4 < 2 ? powers[k] : -powers[k]);
  let N = a.map((row, i) => row.map((_, j) => (i === j ? one : 0n)));
  const whole = { re: n % 2 === 0 ? turned(n) : 0n, im: n % 2 === 0 ? 0n : turned(n) };
  const sums = c.map(() => (b[0] ?? []).map(() => ({ re: 0n, im: 0n })));
  for (let k = 1; k <= n; k++) {
    const power = n - k;
    fixedProduct(c, fixedProduct(N, b)).forEach((row, i) => {
      row.forEach((x, j) => {
        sums[i][j][power % 2 === 0 ? "re" : "im"] += times(x, turned(power));
      });
    });
    const next = fixedProduct(a, N);
    const coefficient = -next.reduce((trace, row, i) => trace + row[i], 0n) / BigInt(k);
    whole[power % 2 === 0 ? "re" : "im"] += times(coefficient, turned(power));
    N = next.map((row, i) => row.map((x, j) => (i === j ? x + coefficient : x)));
  }
  const size = times(whole.re, whole.re) + times(whole.im, whole.im);
  return sums
    .flat()
    .flatMap(({ re, im }) => [
      quotient(times(re, whole.re) + times(im, whole.im), size),
      quotient(times(im, whole.re) - times(re, whole.im), size),
    ]);
}
