import type { Complex } from "../plant/model";

/** π = HIGH + LOW to twice the digits of a double. */
const HIGH = Math.PI;
const LOW = 1.2246467991473532e-16;
const TERMS = 12;

/**
 * cos θ + i sin θ in plain arithmetic, so that every engine gives the same bits. Needed to place a given frequency of a
 * sampled plant on the unit circle and nowhere else: no gain is computed from it.
 *
 * Units     θ in rad, 0 ≤ θ ≤ π
 * Accuracy  two roundings
 * Source    Taylor series on |θ| ≤ π/4
 */
export function circlePoint(angle: number): Complex {
  if (angle > HIGH / 2) {
    const { re, im } = circlePoint(HIGH - angle + LOW);
    return { re: -re, im };
  }
  if (angle > HIGH / 4) {
    const { re, im } = circlePoint(HIGH / 2 - angle + LOW / 2);
    return { re: im, im: re };
  }
  const square = angle * angle;
  let cos = 1;
  let sin = 1;
  for (let k = TERMS; k > 0; k--) {
    cos = 1 - (square / ((2 * k - 1) * (2 * k))) * cos;
    sin = 1 - (square / (2 * k * (2 * k + 1))) * sin;
  }
  return { re: cos, im: angle * sin };
}

/**
 * Angle of re + i im, in plain arithmetic; only reported figures (phases, frequencies of sampled plants) come from it.
 *
 * Units     rad, -π < angle ≤ π; 0 for 0
 * Accuracy  a few roundings
 * Source    halving the angle twice, then the arctangent series
 */
export function angleOf({ re, im }: Complex): number {
  const x = Math.abs(re);
  const y = Math.abs(im);
  if (x === 0 && y === 0) return 0;
  const first = y <= x ? arctangent(y / x) : HIGH / 2 - (arctangent(x / y) - LOW / 2);
  const upper = re < 0 ? HIGH - (first - LOW) : first;
  return im < 0 ? -upper : upper;
}

/** For 0 ≤ t ≤ 1. */
function arctangent(t: number): number {
  const half = t / (1 + Math.sqrt(1 + t * t));
  const quarter = half / (1 + Math.sqrt(1 + half * half));
  const square = quarter * quarter;
  let sum = 0;
  for (let k = TERMS; k >= 0; k--) sum = 1 / (2 * k + 1) - square * sum;
  return 4 * quarter * sum;
}
