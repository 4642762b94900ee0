import { complexQuotient, modulus } from "../linalg/complex";
import type { Wide } from "../linalg/double-double";
import { type WideNumber, wideDifference, wideQuotient, wideRoot, wideSum, wideTimes, ZERO } from "../linalg/wide-number";
import type { Complex } from "../plant/model";

type WideComplex = { readonly re: WideNumber; readonly im: WideNumber };

const MOST_ROUNDS = 200;
/** What the coefficients of a wide matrix can be told from zero by: some thousand ε². */
const COEFFICIENT_NOISE = 1e-27;

/**
 * Eigenvalues of a small matrix of wide numbers whose eigenvalues lie close together: the mean, and the roots of the
 * characteristic polynomial about it. Where that polynomial is λ^k within its rounding they are k times the mean.
 *
 * Shapes    s k×k, k ≤ 8 → k values, conjugates exactly so
 * Units     those of s
 * Accuracy  simple values to ε, a value of multiplicity j to about ε^(2/j); at most 200 rounds
 * Source    Aberth, Math. Comput. 27 (1973) 339-344; Faddeev & Faddeeva, Computational Methods of Linear Algebra, 1963,
 *           for the coefficients (from memory)
 */
export function wideRoots(s: Wide, k: number): Complex[] {
  const at = (i: number): WideNumber => ({ hi: s.hi[i], lo: s.lo[i] });
  const whole = (x: number): WideNumber => ({ hi: x, lo: 0 });
  let trace = ZERO;
  for (let i = 0; i < k; i++) trace = wideSum(trace, at(i * k + i));
  const mean = wideQuotient(trace, whole(k));
  const t = Array.from({ length: k * k }, (_, i) => (i % (k + 1) === 0 ? wideDifference(at(i), mean) : at(i)));
  const size = Math.sqrt(t.reduce((sum, { hi }) => sum + hi * hi, 0));
  const all = Math.sqrt(s.hi.reduce((sum, x) => sum + x * x, 0));
  const coefficients = characteristic(t, k);
  let power = 1;
  const still = coefficients.every(({ hi }, j) => {
    const small = Math.abs(hi) <= (j + 1) * COEFFICIENT_NOISE * all * power;
    power *= size;
    return small;
  });
  const value = (x: WideComplex): Complex => {
    const re = wideSum(x.re, mean).hi;
    return { re: re + 0, im: Math.abs(x.im.hi) <= 2 * Number.EPSILON * Math.abs(re) ? 0 : x.im.hi };
  };
  if (k === 1 || still) return Array.from({ length: k }, () => ({ re: mean.hi + 0, im: 0 }));
  if (k === 2) return pairOf(coefficients[1]).map(value);
  return roots(coefficients, size).map(value);
}

/** c with λ^k + c[0] λ^(k-1) + … + c[k-1] = det(λ I - t). */
function characteristic(t: readonly WideNumber[], k: number): WideNumber[] {
  let product = [...t];
  const c: WideNumber[] = [];
  for (let j = 1; j <= k; j++) {
    let trace = ZERO;
    for (let i = 0; i < k; i++) trace = wideSum(trace, product[i * k + i]);
    const coefficient = wideQuotient(trace, { hi: -j, lo: 0 });
    c.push(coefficient);
    const shifted = product.map((x, i) => (i % (k + 1) === 0 ? wideSum(x, coefficient) : x));
    product = t.map((_, i) => {
      let sum = ZERO;
      for (let l = 0; l < k; l++) sum = wideSum(sum, wideTimes(t[i - (i % k) + l], shifted[l * k + (i % k)]));
      return sum;
    });
  }
  return c;
}

/** The roots of λ² + c. */
function pairOf(c: WideNumber): WideComplex[] {
  const root = wideRoot(c.hi > 0 ? c : { hi: -c.hi, lo: -c.lo });
  const other = { hi: -root.hi, lo: -root.lo };
  if (c.hi > 0) return [root, other].map((im) => ({ re: ZERO, im }));
  return [root, other].map((re) => ({ re, im: ZERO }));
}

function roots(c: readonly WideNumber[], size: number): WideComplex[] {
  const k = c.length;
  // Start on an ellipse that no symmetry of the roots shares.
  let x: WideComplex[] = Array.from({ length: k }, (_, i) => {
    const turn = (2 * i + 0.7) / k - 1;
    const height = 2 * Math.abs(turn) - 1;
    return { re: { hi: size * height, lo: 0 }, im: { hi: (turn < 0 ? -1 : 1) * size * (1.1 - Math.abs(height)), lo: 0 } };
  });
  for (let round = 0; round < MOST_ROUNDS; round++) {
    let moved = 0;
    for (let i = 0; i < k; i++) {
      const step = aberthStep(c, x, i);
      moved = Math.max(moved, modulus(step) / size);
      const next = {
        re: wideDifference(x[i].re, { hi: step.re, lo: 0 }),
        im: wideDifference(x[i].im, { hi: step.im, lo: 0 }),
      };
      x = x.with(i, next);
    }
    if (moved <= Number.EPSILON * Number.EPSILON) break;
  }
  return x.map((value) => joined(value, x));
}

/** Mean with the conjugate of the value that lies nearest its own conjugate; real where that is the value itself. */
function joined(value: WideComplex, all: readonly WideComplex[]): WideComplex {
  let partner = value;
  let nearest = Number.POSITIVE_INFINITY;
  for (const other of all) {
    const distance = modulus({
      re: wideDifference(other.re, value.re).hi,
      im: wideSum(other.im, value.im).hi,
    });
    if (distance > nearest || (distance === nearest && other !== value)) continue;
    nearest = distance;
    partner = other;
  }
  if (partner === value) return { re: value.re, im: ZERO };
  const half = { hi: 0.5, lo: 0 };
  return {
    re: wideTimes(wideSum(value.re, partner.re), half),
    im: wideTimes(wideDifference(value.im, partner.im), half),
  };
}

function aberthStep(c: readonly WideNumber[], x: readonly WideComplex[], i: number): Complex {
  let value: WideComplex = { re: { hi: 1, lo: 0 }, im: ZERO };
  let slope: Complex = { re: 0, im: 0 };
  const hi = { re: x[i].re.hi, im: x[i].im.hi };
  for (const coefficient of c) {
    slope = {
      re: slope.re * hi.re - slope.im * hi.im + value.re.hi,
      im: slope.re * hi.im + slope.im * hi.re + value.im.hi,
    };
    value = {
      re: wideSum(wideDifference(wideTimes(value.re, x[i].re), wideTimes(value.im, x[i].im)), coefficient),
      im: wideSum(wideTimes(value.re, x[i].im), wideTimes(value.im, x[i].re)),
    };
  }
  const now = { re: value.re.hi, im: value.im.hi };
  if (now.re === 0 && now.im === 0) return now;
  // p / (p' - p Σ 1/(x_i - x_j)), safe where p' vanishes.
  let below = slope;
  x.forEach((other, j) => {
    if (j === i) return;
    const gap = { re: wideDifference(x[i].re, other.re).hi, im: wideDifference(x[i].im, other.im).hi };
    if (gap.re === 0 && gap.im === 0) return;
    const pull = complexQuotient(now, gap);
    below = { re: below.re - pull.re, im: below.im - pull.im };
  });
  if (below.re === 0 && below.im === 0) return { re: 0, im: 0 };
  return complexQuotient(now, below);
}
