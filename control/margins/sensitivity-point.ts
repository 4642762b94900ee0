import { NumericalError } from "../errors";
import { factorShiftedHessenberg, solveShiftedHessenberg } from "../linalg/complex-hessenberg";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import { requireRepresentable } from "../linalg/require-representable";
import type { Complex } from "../plant/model";
import type { FrequencySystem } from "./prepare-frequency";
import { boundaryPoint } from "./response-at";

/** S and T = 1 - S of one loop at a coordinate of the boundary, with what rounding may have done to each. L = T / S. */
export type SensitivityPoint = {
  readonly v: number;
  readonly S: Complex;
  readonly T: Complex;
  readonly errorOfS: number;
  readonly errorOfT: number;
};

/**
 * Evaluates the sensitivity of a single loop. T does not come from 1 - S, so that it keeps its digits where the loop has
 * little gain.
 *
 * Shapes    a stable system with one input and one output
 * Throws    too-large
 * Accuracy  the two errors are 4 n ε times the sum of the sizes of the terms
 */
export function sensitivityAt(system: FrequencySystem, v: number): SensitivityPoint {
  const { n, h, b, c, rate, size, period, room } = system;
  const direct = timesPowerOfTwo(system.d[0], size);
  const s = boundaryPoint(v, period);
  let re = 0;
  let im = 0;
  let terms = 0;
  if (s !== null && n > 0) {
    factorShiftedHessenberg(h, n, { re: timesPowerOfTwo(s.re, rate), im: timesPowerOfTwo(s.im, rate) }, room.factors);
    if (room.factors.zeroPivot >= 0) throw new NumericalError("too-large", { what: "gain", limit: Number.MAX_VALUE });
    room.re.set(b);
    room.im.fill(0);
    solveShiftedHessenberg(room.factors, room.re, room.im, 1);
    for (let k = 0; k < n; k++) {
      re += c[k] * room.re[k];
      im += c[k] * room.im[k];
      terms += Math.abs(c[k]) * (Math.abs(room.re[k]) + Math.abs(room.im[k]));
    }
  }
  const unit = 4 * Math.max(n, 1) * Number.EPSILON;
  const moved = { re: timesPowerOfTwo(re, size), im: timesPowerOfTwo(im, size) };
  requireRepresentable("gain", [moved.re, moved.im, direct, timesPowerOfTwo(terms, size)]);
  const errorOfT = unit * (timesPowerOfTwo(terms, size) + Math.abs(1 - direct));
  return {
    v,
    S: { re: direct + moved.re, im: moved.im },
    T: { re: 1 - direct - moved.re, im: 0 - moved.im },
    errorOfS: errorOfT + unit * Math.abs(direct),
    errorOfT,
  };
}
