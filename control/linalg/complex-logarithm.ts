import type { Complex } from "../plant/model";
import { exponentOf, timesPowerOfTwo } from "./power-of-two";

const { LN2 } = Math;
const LN2_REST = 2.3190468138462996e-17;
const QUARTER = Math.PI / 4;
const QUARTER_REST = 3.061616997868383e-17;
/** Powers of at most tan²(π/8) = 0.172 fall below half an ulp after this many. */
const TERMS = 24;

/**
 * Principal logarithm of z ≠ 0, with only + - * / so that every engine gives the same bits.
 *
 * Units     im in (-π, π]
 * Accuracy  a few ε of |ln z|; re keeps its relative accuracy as |z| nears one
 * Source    series of the inverse tangent and hyperbolic tangent: Abramowitz & Stegun 1964, 4.4.42 and 4.6.33
 */
export function complexLogarithm(z: Complex): Complex {
  return { re: logarithmOfModulus(z), im: angle(z) };
}

function logarithmOfModulus({ re, im }: Complex): number {
  const large = Math.max(Math.abs(re), Math.abs(im));
  const small = Math.min(Math.abs(re), Math.abs(im));
  const exponent = large > 0.7 && large < 1.5 ? 0 : exponentOf(large);
  const x = timesPowerOfTwo(large, -exponent);
  const y = timesPowerOfTwo(small, -exponent);
  // |z|² - 1 without forming the square of what is near one; ln(1 + w) / 2 = artanh(w / (2 + w)).
  const w = (x - 1) * (x + 1) + y * y;
  if (w <= 1) return exponent * LN2 + (exponent * LN2_REST + series(w / (2 + w), 1));
  const v = (w - 3) / 4;
  return (exponent + 1) * LN2 + ((exponent + 1) * LN2_REST + series(v / (2 + v), 1));
}

function angle({ re, im }: Complex): number {
  const x = Math.abs(re);
  const y = Math.abs(im);
  const steep = y > x;
  const t = steep ? x / y : y / x;
  // tan(π/8): beyond it the angle is taken from the diagonal.
  const rest = t > 0.41421356 ? series((steep ? x - y : y - x) / (x + y), -1) : series(t, -1);
  const quarters = t > 0.41421356 ? 1 : 0;
  const first = steep ? 2 - quarters : quarters;
  const turned = steep ? -rest : rest;
  const whole = re < 0 || Object.is(re, -0) ? 4 - first : first;
  const part = re < 0 || Object.is(re, -0) ? -turned : turned;
  const size = whole * QUARTER + (whole * QUARTER_REST + part);
  return im < 0 ? -size : size;
}

/** x + sign x³/3 + x⁵/5 + ...: artanh for sign 1, arctan for sign -1, |x| ≤ 0.42. */
function series(x: number, sign: 1 | -1): number {
  const square = sign * x * x;
  let sum = 0;
  for (let k = TERMS; k > 0; k--) sum = square * (1 / (2 * k + 1) + sum);
  return x + x * sum;
}
