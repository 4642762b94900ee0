import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import { evenStateUnits } from "./state-units";

/** A plant in exact powers of two of its units: a = D⁻¹ A D · time, b = D⁻¹ B diag(input), so that K = diag(input) Ks D⁻¹ / time. */
export type ScaledPlant = {
  readonly n: number;
  readonly m: number;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly state: Float64Array;
  readonly input: Float64Array;
  readonly time: number;
};

/**
 * Brings time, inputs and, when asked, states of (A, B) to like sizes by powers of two.
 *
 * Shapes    A n×n, B n×m, row-major; `fastest` is the largest part of a wanted pole
 * Units     any; time and inputs come out with entries of size one
 * Throws    nothing: finite entries are the caller's duty
 * Accuracy  exact but for underflow of entries negligible beside others
 * Source    Curtis & Reid, J. Inst. Maths Applics 10 (1972) 118-124
 */
export function scalePlant(
  A: Float64Array,
  B: Float64Array,
  n: number,
  m: number,
  fastest: number,
  balanced: boolean,
): ScaledPlant {
  const state = balanced ? evenStateUnits(A, B, n, m) : workArray(n).fill(1);
  const a = workArray(n * n);
  const b = workArray(n * m);
  const input = workArray(m);
  const size = unitPower(largestEntry(A));
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) a[i * n + j] = (A[i * n + j] * size * state[j]) / state[i];
  const time = unitPower(Math.max(largestEntry(a) / size, fastest));
  for (let i = 0; i < a.length; i++) a[i] *= time / size;
  for (let j = 0; j < m; j++) {
    let largest = 0;
    for (let i = 0; i < n; i++) largest = Math.max(largest, Math.abs(B[i * m + j] / state[i]));
    input[j] = unitPower(largest);
    for (let i = 0; i < n; i++) b[i * m + j] = (B[i * m + j] / state[i]) * input[j];
  }
  return { n, m, a, b, state, input, time };
}

function unitPower(size: number): number {
  return size === 0 ? 1 : powerOfTwo(-exponentOf(size));
}
