import { Matrix } from "ml-matrix";
import type { ComplexVector } from "../linalg/complex";
import { pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import { smallestSingularComplex } from "../linalg/singular-values";
import type { Complex } from "../plant/model";
import type { BalancedSystem } from "./balance-system";
import type { RefinedZero } from "./refine-zeros";
import type { ZeroBlock } from "./zero-block";

/**
 * A zero s with what it blocks. With u(t) = inputDirection e^(st) and the start x(0) = stateDirection every output stays at
 * rest; outputDirection weighs the outputs so that their sum answers to no input at s. Null where a direction is not unique:
 * with more inputs than independent outputs, or more outputs than independent inputs.
 *
 * Shapes    state n, input m, output p
 * Units     those of the signals; input and output directions have length one (where no input takes part, the state's has)
 */
export type TransmissionZero = Complex & {
  readonly stateDirection: readonly Complex[] | null;
  readonly inputDirection: readonly Complex[] | null;
  readonly outputDirection: readonly Complex[] | null;
};

/** A part this small beside the whole balanced direction is rounding. */
const NO_PART = 64 * Number.EPSILON;

/** The zero of a balanced system in the given units of time and signals, with directions from its blocks or singular vectors. */
export function directedZero({ value, right: block, left }: RefinedZero, system: BalancedSystem, rank: number): TransmissionZero {
  const { n, m, p, timeScale, stateScale, inputScale, outputScale } = system;
  const singular = (rank === m && !block) || (rank === p && !left) ? singularVectors(system, value) : null;
  const motions = rank !== m ? null : block ? vectorOf(block, value) : singular?.right;
  const weights = rank !== p ? null : left ? vectorOf(left, value) : singular?.left;
  const motion = motions ? scaledDirection(motions, n, stateScale, inputScale) : null;
  const seen = weights
    ? scaledDirection(
        weights,
        n,
        stateScale.map((scale) => timeScale / scale),
        outputScale,
      )
    : null;
  return {
    re: value.re / timeScale,
    im: value.im / timeScale,
    stateDirection: motion?.state ?? null,
    inputDirection: motion?.signal ?? null,
    outputDirection: seen?.signal ?? null,
  };
}

/** The null vector that belongs to one eigenvalue of a block of one real value or one pair. */
function vectorOf({ v, s, k }: ZeroBlock, value: Complex): ComplexVector {
  const size = v.hi.length / k;
  if (k === 1) return { re: v.hi, im: new Float64Array(size) };
  const upper = { re: value.re - s.hi[0], im: value.im };
  const lower = { re: value.re - s.hi[3], im: value.im };
  const byUpper = Math.abs(s.hi[1]) >= Math.abs(s.hi[2]);
  const first = byUpper ? { re: s.hi[1], im: 0 } : lower;
  const second = byUpper ? upper : { re: s.hi[2], im: 0 };
  const re = new Float64Array(size);
  const im = new Float64Array(size);
  for (let i = 0; i < size; i++) {
    re[i] = v.hi[i * 2] * first.re + v.hi[i * 2 + 1] * second.re;
    im[i] = v.hi[i * 2] * first.im + v.hi[i * 2 + 1] * second.im;
  }
  return { re, im };
}

/** Of [A - s I, B; C, D]; the left one as a row, so that it is the null vector of the transposed system. */
function singularVectors({ n, m, p, a, b, c, d }: BalancedSystem, value: Complex): { right: ComplexVector; left: ComplexVector } {
  const re = Matrix.zeros(n + p, n + m);
  const im = Matrix.zeros(n + p, n + m);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) re.set(i, j, a[i * n + j] - (i === j ? value.re : 0));
    for (let j = 0; j < m; j++) re.set(i, n + j, b[i * m + j]);
    im.set(i, i, -value.im);
  }
  for (let k = 0; k < p; k++) {
    for (let j = 0; j < n; j++) re.set(n + k, j, c[k * n + j]);
    for (let j = 0; j < m; j++) re.set(n + k, n + j, d[k * m + j]);
  }
  const { right, left } = smallestSingularComplex(re, im);
  return { right, left: { re: left.re, im: left.im.map((x) => 0 - x) } };
}

function scaledDirection({ re, im }: ComplexVector, n: number, stateScale: Float64Array, signalScale: Float64Array) {
  const whole = pythagoras(flatNorm(re), flatNorm(im));
  const kept = (i: number): Complex => {
    const large = pythagoras(re[i], im[i]) > NO_PART * whole;
    return { re: large ? re[i] : 0, im: large && Math.abs(im[i]) > NO_PART * whole ? im[i] : 0 };
  };
  const state = Array.from(stateScale, (scale, i) => times(kept(i), { re: scale, im: 0 }));
  const signal = Array.from(signalScale, (scale, j) => times(kept(n + j), { re: scale, im: 0 }));
  const factor = unitFactor(signal) ?? unitFactor(state) ?? { re: 1, im: 0 };
  return { state: finite(state.map((x) => times(x, factor))), signal: finite(signal.map((x) => times(x, factor))) };
}

/** Null where units as unlike as these leave the range of numbers. */
function finite(x: readonly Complex[]): readonly Complex[] | null {
  return x.every(({ re, im }) => Number.isFinite(re) && Number.isFinite(im)) ? x : null;
}

/** Makes the vector one unit long and its largest entry positive. */
function unitFactor(x: readonly Complex[]): Complex | null {
  const sizes = x.map(({ re, im }) => pythagoras(re, im));
  const length = flatNorm(sizes);
  if (!(length > 0) || !Number.isFinite(length)) return null;
  const largest = Math.max(...sizes);
  const at = sizes.findIndex((size) => size >= largest * (1 - 1e-9));
  return { re: x[at].re / sizes[at] / length, im: (0 - x[at].im) / sizes[at] / length };
}

function times(x: Complex, y: Complex): Complex {
  return { re: x.re * y.re - x.im * y.im + 0, im: x.re * y.im + x.im * y.re + 0 };
}
