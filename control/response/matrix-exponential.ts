import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { type Wide, widen } from "../linalg/double-double";
import { fromFlat, toFlat } from "../linalg/flat";
import { requireFinite, requireSquare } from "../linalg/require";
import { workArray } from "../linalg/work-array";
import { type BalancedDynamics, balanceDynamics, balanceWide, rescaled } from "./balance-dynamics";
import { balancedExponential } from "./balanced-exponential";
import { wideExponential } from "./wide-exponential";

/**
 * Exponential of a square matrix.
 *
 * Shapes    A n×n → n×n
 * Units     A without unit (a rate times a time)
 * Throws    shape-mismatch; not-finite; too-large when the result, or A beyond 2^300, leaves the range of doubles
 * Accuracy  correctly rounded but for the last place, up to norms of 1e12 after balancing; structure of separate blocks kept
 *           exactly. Seven products and log2 of the norm squarings (at most about 310), all with twice the digits of a double
 * Source    series, scaling and squaring as in Moler & Van Loan, SIAM Review 45 (2003) 3-49, method 3, after balancing by
 *           powers of two; the doubled digits make overscaling harmless
 */
export function matrixExponential(A: Matrix): Matrix {
  requireSquare("A", A);
  requireFinite("A", A);
  return fromFlat(roundedExponential(widen(toFlat(A)), A.rows), A.rows, A.rows);
}

/** Rounded exponential of a matrix that is known with twice the digits. */
export function roundedExponential(a: Wide, n: number): Float64Array {
  const balanced = balanceWide(a, n);
  const { hi } = wideExponential(balanced.wide, n);
  // Splitting ends sixteen binades before the doubles do; results out there are left to plain arithmetic.
  const result = hi.every(Number.isFinite) ? hi : balancedExponential(balanced.matrix, n);
  return restored(result, balanced, n);
}

/** The same in plain double arithmetic, tens of times faster: about n ε times the condition of the exponential. */
export function flatExponential(a: Float64Array, n: number): Float64Array {
  const balanced = balanceDynamics(a, n);
  return restored(balancedExponential(balanced.matrix, n), balanced, n);
}

/** Back from balanced coordinates. */
function restored(exponential: Float64Array, { order, scale }: BalancedDynamics, n: number): Float64Array {
  const result = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) result[order[i] * n + order[j]] = rescaled(exponential[i * n + j], scale[i], scale[j]);
  }
  for (const entry of result)
    if (!Number.isFinite(entry)) throw new NumericalError("too-large", { what: "exponential", limit: Number.MAX_VALUE });
  return result;
}
