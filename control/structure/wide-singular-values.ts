import { NumericalError } from "../errors";
import type { Wide } from "../linalg/double-double";
import { flatNorm } from "../linalg/norms";
import { type WideNumber, wideDifference, wideQuotient, wideRoot, wideSum, wideTimes } from "../linalg/wide-number";

const SWEEP_LIMIT = 60;
/** A row this much shorter than another lies below what wide numbers hold beside it. */
const VANISHED = 1e-40;
const ONE: WideNumber = { hi: 1, lo: 0 };

/**
 * Singular values of a matrix of wide numbers, largest first, by turning its rows until they are orthogonal: angles from
 * doubles, rows in wide numbers, so that small values keep digits that a double beside the largest has not.
 *
 * Shapes    x rows×columns → rows values
 * Throws    no-convergence after 60 sweeps
 * Accuracy  each value within a few n ε of itself, while it is above n ε² of the largest
 * Source    Demmel & Veselic, SIAM J. Matrix Anal. Appl. 13 (1992) 1204-1245
 */
export function wideSingularValues(x: Wide, rows: number, columns: number): number[] {
  const hi = Array.from({ length: rows }, (_, i) => x.hi.slice(i * columns, (i + 1) * columns));
  const lo = Array.from({ length: rows }, (_, i) => x.lo.slice(i * columns, (i + 1) * columns));
  const tolerance = Number.EPSILON * Math.sqrt(Math.max(1, columns));
  for (let sweep = 0, turned = true; turned; sweep++) {
    if (sweep === SWEEP_LIMIT) throw new NumericalError("no-convergence", { routine: "wide-jacobi", limit: SWEEP_LIMIT });
    turned = false;
    for (let i = 0; i < rows - 1; i++) for (let j = i + 1; j < rows; j++) turned = turnPair(hi, lo, i, j, tolerance) || turned;
  }
  return hi.map((row) => flatNorm(row)).sort((a, b) => b - a);
}

/** Makes rows i and j orthogonal; false when they are already. */
function turnPair(hi: readonly Float64Array[], lo: readonly Float64Array[], i: number, j: number, tolerance: number): boolean {
  const a = flatNorm(hi[i]);
  const b = flatNorm(hi[j]);
  if (Math.min(a, b) <= VANISHED * Math.max(a, b)) return false;
  let cosine = 0;
  for (let k = 0; k < hi[i].length; k++) cosine += (hi[i][k] / a) * (hi[j][k] / b);
  if (Math.abs(cosine) <= tolerance) return false;
  const zeta = (b / a - a / b) / (2 * cosine);
  const t = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const tangent: WideNumber = { hi: t, lo: 0 };
  const cos = wideQuotient(ONE, wideRoot(wideSum(ONE, wideTimes(tangent, tangent))));
  const sin = wideTimes(cos, tangent);
  for (let k = 0; k < hi[i].length; k++) {
    const x = { hi: hi[i][k], lo: lo[i][k] };
    const y = { hi: hi[j][k], lo: lo[j][k] };
    const first = wideDifference(wideTimes(cos, x), wideTimes(sin, y));
    const second = wideSum(wideTimes(sin, x), wideTimes(cos, y));
    hi[i][k] = first.hi;
    lo[i][k] = first.lo;
    hi[j][k] = second.hi;
    lo[j][k] = second.lo;
  }
  return true;
}
