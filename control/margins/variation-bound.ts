import type { ResponseValue } from "./response-at";

const STEPS = 60;

/**
 * Lower bound of the structured singular value of M for independent complex factors: any b gives diagonal factors
 * bᵢ / (M b)ᵢ that make I - Δ M singular, so that min |(M b)ᵢ| / |bᵢ| is sure. Good vectors come from the power iteration.
 *
 * Shapes    M k×k
 * Units     those of M
 * Accuracy  sure to rounding whatever the iteration does; usually equal to the upper bound. k + 1 starts of 60 steps
 * Source    Packard, Fan & Doyle, Proc. 27th IEEE Conf. Decision and Control 1988, 2132-2137 (from memory)
 */
export function variationBound(M: ResponseValue, k: number): number {
  let best = 0;
  for (let start = 0; start <= k; start++) {
    const b = { re: new Float64Array(k).fill(start < k ? 1 / 64 : 1), im: new Float64Array(k) };
    if (start < k) b.re[start] = 1;
    const w = { re: b.re.slice(), im: b.im.slice() };
    for (let step = 0; step < STEPS; step++) {
      const a = normalised(times(M, b, k, false));
      if (a === null) break;
      best = Math.max(best, least(times(M, b, k, false), b));
      const z = withSizes(a, w);
      const next = normalised(times(M, z, k, true));
      if (next === null) break;
      w.re.set(next.re);
      w.im.set(next.im);
      const moved = withSizes(w, a);
      b.re.set(moved.re);
      b.im.set(moved.im);
    }
  }
  return best;
}

/** M x, or M* x. */
function times({ re, im }: ResponseValue, x: ResponseValue, k: number, adjoint: boolean): ResponseValue {
  const y = { re: new Float64Array(k), im: new Float64Array(k) };
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      const at = adjoint ? j * k + i : i * k + j;
      const imaginary = adjoint ? -im[at] : im[at];
      y.re[i] += re[at] * x.re[j] - imaginary * x.im[j];
      y.im[i] += re[at] * x.im[j] + imaginary * x.re[j];
    }
  }
  return y;
}

function size({ re, im }: ResponseValue, i: number): number {
  return Math.sqrt(re[i] * re[i] + im[i] * im[i]);
}

function normalised(x: ResponseValue): ResponseValue | null {
  let square = 0;
  for (let i = 0; i < x.re.length; i++) square += x.re[i] * x.re[i] + x.im[i] * x.im[i];
  const length = Math.sqrt(square);
  if (!(length > 0) || !Number.isFinite(length)) return null;
  return { re: x.re.map((entry) => entry / length), im: x.im.map((entry) => entry / length) };
}

/** Phases of the first, sizes of the second. */
function withSizes(phases: ResponseValue, sizes: ResponseValue): ResponseValue {
  const y = { re: new Float64Array(phases.re.length), im: new Float64Array(phases.re.length) };
  for (let i = 0; i < y.re.length; i++) {
    const own = size(phases, i);
    const factor = own > 0 ? size(sizes, i) / own : 0;
    y.re[i] = own > 0 ? phases.re[i] * factor : size(sizes, i);
    y.im[i] = phases.im[i] * factor;
  }
  return y;
}

/** Smallest ratio of sizes over the channels that take part. */
function least(image: ResponseValue, b: ResponseValue): number {
  let ratio = Number.POSITIVE_INFINITY;
  for (let i = 0; i < b.re.length; i++) {
    const own = size(b, i);
    if (own > 0) ratio = Math.min(ratio, size(image, i) / own);
  }
  return Number.isFinite(ratio) ? ratio : 0;
}
