import { powerOfTwo } from "../linalg/power-of-two";
import type { Complex } from "../plant/model";

const LN2_HIGH = 0.6931471803691238;
const LN2_LOW = 1.9082149292705877e-10;
const HALF_PI_HIGH = 1.5707963267341256;
const HALF_PI_LOW = 6.077100506506192e-11;
const SMALLEST_EXPONENT = -746;

/**
 * exp(re + i im) from + - * / alone, so that server, worker and browser place the very same sampled poles.
 *
 * Shapes    one complex number, re ≤ 700, 0 ≤ im ≤ π (a sampled loop knows no faster turn)
 * Units     none
 * Throws    nothing in that range
 * Accuracy  4 ε of its modulus (checked against 40-digit values); an underflow is zero
 * Source    argument reduction after Cody & Waite, Software Manual for the Elementary Functions, 1980; constants from memory
 */
export function complexExponential({ re, im }: Complex): Complex {
  const size = realExponential(re);
  const { sine, cosine } = sineAndCosine(im);
  return { re: size * cosine, im: size * sine };
}

function realExponential(x: number): number {
  if (x < SMALLEST_EXPONENT) return 0;
  const steps = Math.round(x / (LN2_HIGH + LN2_LOW));
  const rest = x - steps * LN2_HIGH - steps * LN2_LOW;
  let sum = 1;
  for (let k = 16; k >= 1; k--) sum = 1 + (sum * rest) / k;
  const half = Math.floor(steps / 2);
  return sum * powerOfTwo(half) * powerOfTwo(steps - half);
}

function sineAndCosine(angle: number): { sine: number; cosine: number } {
  const quarters = Math.round(angle / HALF_PI_HIGH);
  const rest = angle - quarters * HALF_PI_HIGH - quarters * HALF_PI_LOW;
  const square = rest * rest;
  let s = 1;
  let c = 1;
  for (let k = 9; k >= 1; k--) {
    s = 1 - (s * square) / (2 * k * (2 * k + 1));
    c = 1 - (c * square) / (2 * k * (2 * k - 1));
  }
  s *= rest;
  if (quarters === 0) return { sine: s, cosine: c };
  return quarters === 1 ? { sine: c, cosine: -s } : { sine: -s, cosine: -c };
}
