import { flatIdentity, flatProduct } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { flatOneNorm } from "../linalg/solve-linear";
import { workArray } from "../linalg/work-array";

const UNIT_ROUNDOFF = Number.EPSILON / 2;

/** Numerator coefficients of the diagonal Padé approximants, the largest norms they serve, 1 / |c| of their error's first term. */
const PADE = {
  3: { b: [120, 60, 12, 1], theta: 1.495585217958292e-2, reach: 100800 },
  5: { b: [30240, 15120, 3360, 420, 30, 1], theta: 2.53939833006323e-1, reach: 10059033600 },
  7: { b: [17297280, 8648640, 1995840, 277200, 25200, 1512, 56, 1], theta: 9.504178996162932e-1, reach: 4487938430976000 },
  9: {
    b: [17643225600, 8821612800, 2075673600, 302702400, 30270240, 2162160, 110880, 3960, 90, 1],
    theta: 2.097847961257068,
    reach: 5.914384781877411e21,
  },
  13: {
    b: [
      64764752532480000, 32382376266240000, 7771770303897600, 1187353796428800, 129060195264000, 10559470521600, 670442572800,
      33522128640, 1323241920, 40840800, 960960, 16380, 182, 1,
    ],
    theta: 4.25,
    reach: 1.1325077560602111e35,
  },
} as const;
type Degree = keyof typeof PADE;

/** Even powers of `a` · 2^-exponent, which has norm below two, and their 1-norms. */
type Powers = { readonly a: Float64Array; readonly exponent: number; readonly even: Float64Array[]; readonly norms: number[] };

/**
 * Exponential of a matrix that is already balanced. The degree and the number of squarings follow from the norms of its powers,
 * not of itself, so that a large one-way coupling does not cost digits.
 *
 * Shapes    a n×n row-major → n×n; may hold Infinity where the result leaves the range of doubles
 * Accuracy  backward error within the unit roundoff before squaring
 * Source    Al-Mohy & Higham, SIAM J. Matrix Anal. Appl. 31 (2009) 970-989, algorithm 5.1; θ₁₃ lowered to 4.25 as there
 */
export function balancedExponential(a: Float64Array, n: number): Float64Array {
  const norm = flatOneNorm(a, n);
  if (norm === 0) return flatIdentity(n);
  const exponent = Math.max(0, exponentOf(norm));
  const unit = exponent === 0 ? a : a.map((entry) => entry * powerOfTwo(-exponent));
  const powers: Powers = { a: unit, exponent, even: [], norms: [] };
  for (const degree of [3, 5, 7, 9] as const) if (serves(powers, n, degree)) return pade(powers, n, degree, 0);
  let scaling = squaringsNeeded(powers, n);
  scaling += extraSquarings(powers, n, scaling);
  let result = pade(powers, n, 13, scaling);
  for (let k = 0; k < scaling; k++) result = flatProduct(result, result, n, n, n);
  return result;
}

/** a^(2k) and its norm, formed when first asked for. */
function evenPower(powers: Powers, n: number, k: number): { matrix: Float64Array; norm: number } {
  while (powers.even.length < k) {
    const next = powers.even.length + 1;
    const matrix =
      next === 1
        ? flatProduct(powers.a, powers.a, n, n, n)
        : flatProduct(powers.even[Math.ceil(next / 2) - 1], powers.even[Math.floor(next / 2) - 1], n, n, n);
    powers.even.push(matrix);
    powers.norms.push(flatOneNorm(matrix, n));
  }
  return { matrix: powers.even[k - 1], norm: powers.norms[k - 1] };
}

/** |a^(2k)| ≤ (θ 2^(scaling - exponent))^(2k) */
function within(powers: Powers, n: number, k: number, theta: number, scaling: number): boolean {
  const limit = theta * powerOfTwo(scaling - powers.exponent);
  let power = 1;
  for (let j = 0; j < 2 * k; j++) power *= limit;
  return evenPower(powers, n, k).norm <= power;
}

function serves(powers: Powers, n: number, degree: 3 | 5 | 7 | 9): boolean {
  const { theta } = PADE[degree];
  const low = degree <= 5 ? 2 : 3;
  return within(powers, n, low, theta, 0) && within(powers, n, low + 1, theta, 0) && errorTerm(powers, n, degree, 0) <= 1;
}

/** Smallest s for which one of the two pairs of neighbouring powers is within reach of degree 13. */
function squaringsNeeded(powers: Powers, n: number): number {
  const { theta } = PADE[13];
  for (let s = 0; s <= powers.exponent; s++) {
    if (!within(powers, n, 4, theta, s)) continue;
    if (within(powers, n, 3, theta, s) || within(powers, n, 5, theta, s)) return s;
  }
  return powers.exponent;
}

/** More squarings where rounding in |a|^27 asks for them; each divides the term by 2^26. */
function extraSquarings(powers: Powers, n: number, scaling: number): number {
  let term = errorTerm(powers, n, 13, scaling);
  let extra = 0;
  for (; term > 1 && extra < powers.exponent + 1; extra++) term /= 67108864;
  return extra;
}

/** First term of the backward error with absolute values, over the unit roundoff: | |a|^(2m+1) | / (|a| reach u). */
function errorTerm(powers: Powers, n: number, degree: Degree, scaling: number): number {
  const { a } = powers;
  const factor = powerOfTwo(powers.exponent - scaling);
  let sums = workArray(n).fill(1);
  for (let k = 0; k < 2 * degree + 1; k++) {
    const next = workArray(n);
    for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) next[j] += sums[i] * Math.abs(a[i * n + j]) * factor;
    sums = next;
  }
  const norm = flatOneNorm(a, n) * factor;
  return sums.reduce((most, sum) => Math.max(most, sum), 0) / (norm * PADE[degree].reach * UNIT_ROUNDOFF);
}

function pade(powers: Powers, n: number, degree: Degree, scaling: number): Float64Array {
  const { b } = PADE[degree];
  const factor = powerOfTwo(powers.exponent - scaling);
  const scaledPower = (k: number) => {
    const weight = power(factor, 2 * k);
    return evenPower(powers, n, k).matrix.map((entry) => entry * weight);
  };
  const even = Array.from({ length: degree === 13 ? 3 : (degree - 1) / 2 }, (_, k) => scaledPower(k + 1));
  const odd = combine(n, even, (k) => b[2 * k + 1]);
  const plain = combine(n, even, (k) => b[2 * k]);
  if (degree === 13) {
    addTo(odd, flatProduct(even[2], combineHigh(n, even, b, 1), n, n, n));
    addTo(plain, flatProduct(even[2], combineHigh(n, even, b, 0), n, n, n));
  }
  const scaled = powers.a.map((entry) => entry * factor);
  const u = flatProduct(scaled, odd, n, n, n);
  const numerator = plain.map((entry, k) => entry + u[k]);
  const denominator = plain.map((entry, k) => entry - u[k]);
  return solveLu(factorLu(denominator, n), numerator, n);
}

/** coefficient(0) I + coefficient(1) a² + ... */
function combine(n: number, even: readonly Float64Array[], coefficient: (k: number) => number): Float64Array {
  const sum = workArray(n * n);
  for (let k = even.length; k >= 1; k--) {
    const weight = coefficient(k);
    for (let i = 0; i < sum.length; i++) sum[i] += weight * even[k - 1][i];
  }
  for (let i = 0; i < n; i++) sum[i * n + i] += coefficient(0);
  return sum;
}

/** Terms of degree 8 to 13 over a⁶. */
function combineHigh(n: number, even: readonly Float64Array[], b: readonly number[], parity: 0 | 1): Float64Array {
  const sum = workArray(n * n);
  for (let k = 3; k >= 1; k--) for (let i = 0; i < sum.length; i++) sum[i] += b[2 * (k + 3) + parity] * even[k - 1][i];
  return sum;
}

function addTo(sum: Float64Array, more: Float64Array): void {
  for (let i = 0; i < sum.length; i++) sum[i] += more[i];
}

function power(x: number, k: number): number {
  let product = 1;
  for (let j = 0; j < k; j++) product *= x;
  return product;
}
