import { pythagoras } from "./flat";

/** Upper triangular (c = 0), or with equal diagonal and b·c < 0; rows turn by [cos sin; -sin cos]. */
export type StandardBlock = { a: number; b: number; c: number; d: number; cos: number; sin: number };

/**
 * Schur factorisation of a real 2×2 matrix in standard form: [a b; c d] = G [a' b'; c' d'] G', G = [cos -sin; sin cos].
 *
 * Accuracy  backward stable; conjugate eigenvalues are a' ± i √|b'| √|c'| exactly
 * Source    Bai & Demmel, On swapping diagonal blocks in real Schur form, Linear Algebra Appl. 186 (1993) 73-95, section 2
 */
export function standardiseBlock(a: number, b: number, c: number, d: number): StandardBlock {
  if (c === 0) return { a, b, c, d, cos: 1, sin: 0 };
  if (b === 0) return { a: d, b: -c, c: 0, d: a, cos: 0, sin: 1 };
  if (a - d === 0 && b > 0 !== c > 0) return { a, b, c, d, cos: 1, sin: 0 };
  const gap = a - d;
  const half = 0.5 * gap;
  const large = Math.max(Math.abs(b), Math.abs(c));
  const small = signedSmaller(b, c);
  const scale = Math.max(Math.abs(half), large);
  const z = (half / scale) * half + (large / scale) * small;
  if (z >= 4 * Number.EPSILON * scale) return splitReal(b, c, d, half, scale, z);
  return makeDiagonalEqual(a, b, c, d, gap);
}

function splitReal(b: number, c: number, d: number, half: number, scale: number, z: number): StandardBlock {
  const root = Math.sqrt(scale) * Math.sqrt(z);
  const step = half + (half >= 0 ? root : -root);
  const length = pythagoras(c, step);
  const other = d - (Math.max(Math.abs(b), Math.abs(c)) / step) * signedSmaller(b, c);
  return { a: d + step, b: b - c, c: 0, d: other, cos: step / length, sin: c / length };
}

/** The smaller of |b|, |c| with the sign of the product, so that larger/step times it is b c / step without overflow. */
function signedSmaller(b: number, c: number): number {
  return Math.min(Math.abs(b), Math.abs(c)) * (b > 0 === c > 0 ? 1 : -1);
}

function makeDiagonalEqual(a: number, b: number, c: number, d: number, gap: number): StandardBlock {
  const sigma = b + c;
  const length = pythagoras(sigma, gap);
  const cos = Math.sqrt(0.5 * (1 + Math.abs(sigma) / length));
  const sin = -((0.5 * gap) / (length * cos)) * (sigma >= 0 ? 1 : -1);
  const aa = a * cos + b * sin;
  const bb = -a * sin + b * cos;
  const cc = c * cos + d * sin;
  const dd = -c * sin + d * cos;
  const upper = bb * cos + dd * sin;
  const lower = -aa * sin + cc * cos;
  const middle = 0.5 * (aa * cos + cc * sin + (-bb * sin + dd * cos));
  if (lower === 0) return { a: middle, b: upper, c: 0, d: middle, cos, sin };
  if (upper === 0) return { a: middle, b: -lower, c: 0, d: middle, cos: -sin, sin: cos };
  if (upper > 0 !== lower > 0) return { a: middle, b: upper, c: lower, d: middle, cos, sin };
  // Real and nearly equal after all: one more rotation makes it triangular.
  const rootUpper = Math.sqrt(Math.abs(upper));
  const rootLower = Math.sqrt(Math.abs(lower));
  const shift = upper > 0 ? rootUpper * rootLower : -(rootUpper * rootLower);
  const scale = 1 / Math.sqrt(Math.abs(upper + lower));
  const c1 = rootUpper * scale;
  const s1 = rootLower * scale;
  return { a: middle + shift, b: upper - lower, c: 0, d: middle - shift, cos: cos * c1 - sin * s1, sin: cos * s1 + sin * c1 };
}
