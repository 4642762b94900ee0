import { NumericalError } from "../errors";
import { complexSingularValues, singularRoom } from "../linalg/complex-singular-values";
import { powerOfTwo } from "../linalg/power-of-two";
import { requireRepresentable } from "../linalg/require-representable";
import type { Complex } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { circlePoint } from "./angle";
import { frequencyGrid } from "./frequency-grid";
import { prepareFrequency } from "./prepare-frequency";
import { evaluateResponse, responseRoom } from "./response-at";

/**
 * G over frequency: entry (i, j) at point k stands in place (k p + i) m + j of `re` and `im`. At the points listed in
 * `unbounded` the system has a pole, the gain has no bound, and zeros stand in place of numbers.
 */
export type FrequencyResponse = {
  readonly frequencies: Float64Array;
  readonly outputs: number;
  readonly inputs: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
  readonly unbounded: readonly number[];
};

/**
 * Frequency response of a continuous system at s = i ω, or of a sampled one at z = e^{i ω period}. A point costs order n² m
 * once the system is in Hessenberg form. The sampled circle is the one place that needs a sine and a cosine; they are made
 * of plain arithmetic, and no design, peak or margin depends on them.
 *
 * Shapes    A n×n, B n×m, C p×n, D p×m, `frequencies` any number ≥ 0 (up to π / period when sampled) or the default grid
 * Units     rad/s; values as y/u
 * Throws    shape-mismatch; not-finite; bad-option { option: "frequency", given } or { option: "period" }; too-large
 * Accuracy  exact for a system within c n ε of the balanced one
 * Source    Laub, IEEE Trans. Autom. Control 26 (1981) 407-408
 */
export function frequencyResponse(
  system: System,
  period: number | null = null,
  frequencies: ArrayLike<number> | null = null,
): FrequencyResponse {
  const prepared = prepareFrequency(system, period);
  const points = frequencies === null ? frequencyGrid(system, period) : Float64Array.from(frequencies);
  const { m, p, size } = prepared;
  const count = p * m;
  const [re, im] = [new Float64Array(points.length * count), new Float64Array(points.length * count)];
  const unbounded: number[] = [];
  const value = responseRoom(prepared);
  // Two factors, because 2^size alone may be beyond the range in which its product with a value is not.
  const half = powerOfTwo(Math.trunc(size / 2));
  const rest = powerOfTwo(size - Math.trunc(size / 2));
  for (let k = 0; k < points.length; k++) {
    if (!evaluateResponse(prepared, placeOf(points[k], period), value)) {
      unbounded.push(k);
      continue;
    }
    for (let at = 0; at < count; at++) {
      re[k * count + at] = value.re[at] * half * rest;
      im[k * count + at] = value.im[at] * half * rest;
      if (!Number.isFinite(re[k * count + at]) || !Number.isFinite(im[k * count + at]))
        throw new NumericalError("too-large", { what: "gain", limit: Number.MAX_VALUE });
    }
  }
  return { frequencies: points, outputs: p, inputs: m, re, im, unbounded };
}

function placeOf(frequency: number, period: number | null): Complex {
  const angle = period === null ? 0 : frequency * period;
  if (!(frequency >= 0) || !Number.isFinite(frequency) || angle > Math.PI * (1 + 4 * Number.EPSILON))
    throw new NumericalError("bad-option", { option: "frequency", given: frequency });
  return period === null ? { re: 0, im: frequency } : circlePoint(Math.min(angle, Math.PI));
}

/**
 * Singular values at every point, largest first, of the response or of the identity plus it: row k holds min(p, m) of them.
 * Points where the response is unbounded have zeros, as in the response.
 *
 * Shapes    k points of p×m → k × min(p, m), row-major
 * Units     those of the response
 * Throws    shape-mismatch when the identity is to be added to a response that is not square; no-convergence; too-large
 * Accuracy  c ε of the largest at each point
 * Source    as `complexSingularValues`
 */
export function responseSingularValues(response: FrequencyResponse, plusIdentity = false): Float64Array {
  const { outputs, inputs, frequencies, re, im, unbounded } = response;
  if (plusIdentity && outputs !== inputs)
    throw new NumericalError("shape-mismatch", { matrix: "response", expected: [inputs, inputs], given: [outputs, inputs] });
  const count = outputs * inputs;
  const room = singularRoom(outputs, inputs);
  const values = new Float64Array(frequencies.length * room.lines);
  const [real, imaginary] = [new Float64Array(count), new Float64Array(count)];
  const left = new Set(unbounded);
  for (let k = 0; k < frequencies.length; k++) {
    if (left.has(k)) continue;
    for (let at = 0; at < count; at++) {
      real[at] = re[k * count + at];
      imaginary[at] = im[k * count + at];
    }
    if (plusIdentity) for (let i = 0; i < inputs; i++) real[i * inputs + i] += 1;
    values.set(complexSingularValues(real, imaginary, room), k * room.lines);
  }
  requireRepresentable("gain", Array.from(values));
  return values;
}
