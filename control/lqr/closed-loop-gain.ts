import type { Matrix } from "ml-matrix";
import { flatIdentity, flatProduct, fromFlat, toFlat } from "../linalg/flat";
import { requireRepresentable } from "../linalg/require-representable";
import { solveFlat } from "../linalg/solve-linear";
import { workCopy } from "../linalg/work-array";

/** A loop u = -K x + v about z = H x + J u. */
export type Loop = { readonly A: Matrix; readonly B: Matrix; readonly H: Matrix; readonly J: Matrix; readonly K: Matrix };

/** Entries of `gain` below their `rounding` are exactly zero. */
export type GainAtPoint = { readonly gain: Matrix; readonly rounding: Matrix };

/** Roundings counted per term. */
const SLACK = 4;

/**
 * Gain from v to z of the closed loop at a real point s (or z, sampled), with a bound on the rounding of every entry.
 *
 * Shapes    A n×n, B n×m, H q×n, J q×m, K m×n → q×m
 * Units     z per input, each entry and its bound in units of its own
 * Throws    singular when the point is a pole of the loop; too-large
 * Accuracy  |error| ≤ rounding, entry by entry, to first order
 * Source    Higham, Accuracy and Stability of Numerical Algorithms, 2nd ed. 2002, theorem 7.4
 */
export function gainAtPoint({ A, B, H, J, K }: Loop, point: number): GainAtPoint {
  const [n, m, q] = [A.rows, B.columns, H.rows];
  const [a, b, h, j, k] = [toFlat(A), toFlat(B), toFlat(H), toFlat(J), toFlat(K)];
  const loop = combined(a, flatProduct(b, k, n, m, n), -1);
  for (let i = 0; i < n; i++) for (let at = i * n; at < (i + 1) * n; at++) loop[at] = (at === i * n + i ? point : 0) - loop[at];
  requireRepresentable("closed loop", loop);
  const inverse = solveFlat(loop, n, flatIdentity(n), n).x;
  const x = solveFlat(loop, n, b, m).x;
  const seen = combined(h, flatProduct(j, k, q, m, n), -1);
  const gain = combined(flatProduct(seen, x, q, n, m), j, 1);
  for (const part of [a, b, h, j, k, x, inverse]) makeSizes(part);
  const sizeLoop = combined(a, flatProduct(b, k, n, m, n), 1);
  for (let i = 0; i < n; i++) sizeLoop[i * n + i] += Math.abs(point);
  const sizeSeen = combined(h, flatProduct(j, k, q, m, n), 1);
  const solving = flatProduct(inverse, combined(flatProduct(sizeLoop, x, n, n, m), b, 1), n, n, m);
  const rounding = combined(flatProduct(sizeSeen, combined(solving, x, 1), q, n, m), j, 1);
  const unit = SLACK * (n + m) * Number.EPSILON;
  for (let at = 0; at < rounding.length; at++) rounding[at] *= unit;
  requireRepresentable("gain at rest", gain);
  requireRepresentable("gain at rest", rounding);
  for (let at = 0; at < gain.length; at++) if (Math.abs(gain[at]) <= rounding[at]) gain[at] = 0;
  return { gain: fromFlat(gain, q, m), rounding: fromFlat(rounding, q, m) };
}

/** x + sign · y */
function combined(x: Float64Array, y: Float64Array, sign: 1 | -1): Float64Array {
  const sum = workCopy(x);
  for (let at = 0; at < sum.length; at++) sum[at] += sign * y[at];
  return sum;
}

function makeSizes(x: Float64Array): void {
  for (let at = 0; at < x.length; at++) x[at] = Math.abs(x[at]);
}
