import { complexSingularValues, singularRoom } from "../linalg/complex-singular-values";
import { largestEntry } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { strongComponents } from "../linalg/strong-components";
import { invertHermitian } from "./hermitian-inverse";
import type { ResponseValue } from "./response-at";

/**
 * The least largest singular value of D M D⁻¹ over positive diagonal D lies in lower..upper; `scale` is the D of `upper`.
 */
export type ScaledBound = { readonly lower: number; readonly upper: number; readonly scale: Float64Array };

const MOST_STEPS = 30;
/** What is left of the way from one level down to the best known bound at the next. */
const CLOSER = 0.1;
/** Blocks that act on each other one way only are scaled apart by this. */
const APART = 2 ** 30;
const OSBORNE_SWEEPS = 20;
/** How near, as a part of it, the level comes to the square of the upper bound; */
const GAP = 2 ** -36;
/** and where the lower bound is taken, which rounding spoils nearer by. */
const DUAL_GAP = 2 ** -27;
/** Newton's decrement that is good enough on the way. */
const ROUGHLY = 0.2;

/**
 * Upper bound of the structured singular value of M for independent complex factors, one for each channel: their exact
 * value for up to three. The convex problem β X - M* X M > 0 in X = D² is solved by centres that follow a falling β.
 *
 * Shapes    M k×k, k ≥ 1
 * Units     those of M; scale none
 * Accuracy  lower and upper are each certain to rounding, by a dual and by a primal point; upper is within 1e-9 of the
 *           least, lower usually within 1e-7. At most about 60 levels of 30 steps
 * Source    Doyle, IEE Proc. D 129 (1982) 242-250; Boyd & El Ghaoui, Linear Algebra Appl. 188 (1993) 63-111
 */
export function scaledBound(M: ResponseValue, k: number): ScaledBound {
  const pattern = new Float64Array(k * k).map((_, at) => (M.re[at] === 0 && M.im[at] === 0 ? 0 : 1));
  const { order, starts } = strongComponents(pattern, k);
  if (starts.length === 2) return ringBound(M, k);
  const scale = new Float64Array(k);
  let [lower, upper] = [0, 0];
  for (let block = 0; block + 1 < starts.length; block++) {
    const members = order.subarray(starts[block], starts[block + 1]);
    const bound = ringBound(part(M, members, k), members.length);
    lower = Math.max(lower, bound.lower);
    upper = Math.max(upper, bound.upper);
    const apart = distanceAbove(pattern, order.subarray(0, starts[block]), members, scale, k);
    const largest = largestEntry(bound.scale);
    members.forEach((channel, i) => {
      scale[channel] = (bound.scale[i] / largest) * apart;
    });
  }
  const whole = rescaled(M, scale, k);
  return { lower, upper: Math.max(upper, complexSingularValues(whole.re, whole.im, singularRoom(k, k))[0]), scale };
}

/** Channels of one block, in its own order. */
function part({ re, im }: ResponseValue, members: Int32Array, k: number): ResponseValue {
  const pick = (x: Float64Array) => Float64Array.from([...members].flatMap((i) => [...members].map((j) => x[i * k + j])));
  return { re: pick(re), im: pick(im) };
}

/** Scale that makes what comes into this block from earlier ones negligible: one-way ties between blocks cost nothing. */
function distanceAbove(pattern: Float64Array, earlier: Int32Array, members: Int32Array, scale: Float64Array, k: number): number {
  let apart = 1;
  for (const i of earlier) for (const j of members) if (pattern[i * k + j] !== 0) apart = Math.max(apart, scale[i] * APART);
  return apart;
}

/** The same where every channel acts on every other one, if only through a third. */
function ringBound(M: ResponseValue, k: number): ScaledBound {
  const size = Math.max(largestEntry(M.re), largestEntry(M.im));
  if (size === 0) return { lower: 0, upper: 0, scale: new Float64Array(k).fill(1) };
  const unit = { re: M.re.map((x) => x / size), im: M.im.map((x) => x / size) };
  const first = osborneScale(unit, k);
  const inner = rescaled(unit, first, k);
  const { lower, upper, weights } = followCentres(inner, k);
  return {
    lower: size * Math.sqrt(lower),
    upper: size * Math.sqrt(upper),
    scale: weights.map((x, i) => Math.sqrt(x) * first[i]),
  };
}

/** D M D⁻¹. */
function rescaled({ re, im }: ResponseValue, scale: Float64Array, k: number): ResponseValue {
  const by = (x: number, at: number) => (x * scale[Math.trunc(at / k)]) / scale[at % k];
  return { re: re.map(by), im: im.map(by) };
}

/** Rows and columns of like length: where the search starts. Channels that are not in a ring stay as they are. */
function osborneScale({ re, im }: ResponseValue, k: number): Float64Array {
  const scale = new Float64Array(k).fill(1);
  for (let sweep = 0; sweep < OSBORNE_SWEEPS; sweep++) {
    let moved = false;
    for (let i = 0; i < k; i++) {
      let row = 0;
      let column = 0;
      for (let j = 0; j < k; j++) {
        if (j === i) continue;
        const ratio = scale[i] / scale[j];
        row += (re[i * k + j] * re[i * k + j] + im[i * k + j] * im[i * k + j]) * ratio * ratio;
        column += (re[j * k + i] * re[j * k + i] + im[j * k + i] * im[j * k + i]) / (ratio * ratio);
      }
      if (!(row > 0 && column > 0)) continue;
      const factor = Math.sqrt(Math.sqrt(column / row));
      const next = scale[i] * factor;
      if (!(next > 1e-100 && next < 1e100)) continue;
      moved ||= factor > 1.01 || factor < 0.99;
      scale[i] = next;
    }
    if (!moved) break;
  }
  return scale;
}

type Centre = { readonly weights: Float64Array; readonly lower: number };
type Search = { readonly lower: number; readonly upper: number; readonly weights: Float64Array };

function followCentres(M: ResponseValue, k: number): Search {
  const squareFor = squareOf(M, k);
  const weights = new Float64Array(k).fill(1);
  let best: Search = { lower: 0, upper: squareFor(weights), weights };
  if (k === 1) return { ...best, lower: best.upper };
  for (let room = CLOSER * best.upper; room > GAP * best.upper; room *= CLOSER) {
    const centre = findCentre(M, k, best.weights, best.upper + room, ROUGHLY);
    if (centre === null) break;
    const upper = squareFor(centre.weights);
    // Whatever the upper bound fell by, the next level may start that much further above it.
    room += Math.max(0, best.upper - upper) / 4;
    if (upper < best.upper) best = { lower: 0, upper, weights: centre.weights };
  }
  const last = findCentre(M, k, best.weights, best.upper * (1 + DUAL_GAP), DUAL_GAP);
  return { ...best, lower: Math.min(last?.lower ?? 0, best.upper) };
}

/** Square of the largest singular value of √X M √X⁻¹. */
function squareOf(M: ResponseValue, k: number): (x: Float64Array) => number {
  const room = singularRoom(k, k);
  return (x) => {
    const scaled = rescaled(M, x.map(Math.sqrt), k);
    const value = complexSingularValues(scaled.re, scaled.im, room)[0];
    return value * value;
  };
}

/**
 * Newton's method for the least -log det(β X - M* X M) with the sum of X held, from a point where that is definite; and the
 * dual bound min (M Z M*)ᵢᵢ / Zᵢᵢ of the last inverse Z.
 */
function findCentre(M: ResponseValue, k: number, start: Float64Array, beta: number, precision: number): Centre | null {
  const weights = start.slice();
  let lower = 0;
  for (let step = 0; step < MOST_STEPS; step++) {
    const P = leveled(M, k, weights, beta);
    if (!invertHermitian(P.re, P.im, k)) return step === 0 ? null : { weights: start, lower };
    const U = productWithAdjoint(P, M, k);
    const V = product(M, U, k);
    let dual = Number.POSITIVE_INFINITY;
    for (let i = 0; i < k; i++) dual = Math.min(dual, V.re[i * k + i] / P.re[i * k + i]);
    lower = Math.max(lower, dual);
    const move = newtonMove(P, U, V, weights, beta, k);
    if (move === null) return { weights, lower };
    const damping = move.decrement > 0.25 ? 1 / (1 + move.decrement) : 1;
    for (let i = 0; i < k; i++) weights[i] += damping * move.direction[i];
    if (move.decrement < precision) break;
  }
  return weights.every((x) => x > 0 && Number.isFinite(x)) ? { weights, lower } : { weights: start, lower };
}

/** β X - M* X M. */
function leveled({ re, im }: ResponseValue, k: number, x: Float64Array, beta: number): ResponseValue {
  const value = { re: new Float64Array(k * k), im: new Float64Array(k * k) };
  for (let i = 0; i < k; i++) {
    value.re[i * k + i] = beta * x[i];
    for (let j = 0; j < k; j++) {
      for (let l = 0; l < k; l++) {
        const [ar, ai, br, bi] = [re[l * k + i], im[l * k + i], re[l * k + j], im[l * k + j]];
        value.re[i * k + j] -= x[l] * (ar * br + ai * bi);
        value.im[i * k + j] -= x[l] * (ar * bi - ai * br);
      }
    }
  }
  return value;
}

function productWithAdjoint(P: ResponseValue, M: ResponseValue, k: number): ResponseValue {
  const adjoint = { re: new Float64Array(k * k), im: new Float64Array(k * k) };
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < k; j++) {
      adjoint.re[j * k + i] = M.re[i * k + j];
      adjoint.im[j * k + i] = 0 - M.im[i * k + j];
    }
  }
  return product(P, adjoint, k);
}

function product(a: ResponseValue, b: ResponseValue, k: number): ResponseValue {
  const c = { re: new Float64Array(k * k), im: new Float64Array(k * k) };
  for (let i = 0; i < k; i++) {
    for (let l = 0; l < k; l++) {
      const [ar, ai] = [a.re[i * k + l], a.im[i * k + l]];
      for (let j = 0; j < k; j++) {
        c.re[i * k + j] += ar * b.re[l * k + j] - ai * b.im[l * k + j];
        c.im[i * k + j] += ar * b.im[l * k + j] + ai * b.re[l * k + j];
      }
    }
  }
  return c;
}

/** Direction in relative changes of X, which keeps the equations well scaled, and Newton's decrement. */
function newtonMove(P: ResponseValue, U: ResponseValue, V: ResponseValue, x: Float64Array, beta: number, k: number) {
  const size = (Y: ResponseValue, at: number) => Y.re[at] * Y.re[at] + Y.im[at] * Y.im[at];
  const width = k + 1;
  const equations = new Float64Array(width * width);
  const right = new Float64Array(width);
  for (let i = 0; i < k; i++) {
    right[i] = x[i] * (beta * P.re[i * k + i] - V.re[i * k + i]);
    for (let j = 0; j < k; j++) {
      const [at, turned] = [i * k + j, j * k + i];
      equations[i * width + j] = x[i] * x[j] * (beta * beta * size(P, at) - beta * (size(U, at) + size(U, turned)) + size(V, at));
    }
    equations[i * width + k] = x[i];
    equations[k * width + i] = x[i];
  }
  const factors = factorLu(equations, width);
  if (factors.zeroPivot >= 0) return null;
  const relative = solveLu(factors, right, 1);
  let square = 0;
  for (let i = 0; i < k; i++) square += relative[i] * right[i];
  if (!(square >= 0) || !Number.isFinite(square)) return null;
  return { direction: x.map((entry, i) => entry * relative[i]), decrement: Math.sqrt(square) };
}
