import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import type { Complex } from "../plant/model";
import { safeShift } from "./balance";
import { flatIdentity, flatTranspose, fromFlat, toFlat } from "./flat";
import { francisIteration } from "./francis";
import { reduceToHessenberg } from "./hessenberg";
import { powerOfTwo } from "./power-of-two";
import { requireFinite, requireSquare } from "./require";
import { schurValues } from "./schur-values";
import { workCopy } from "./work-array";

/** A = Q T Q', Q orthogonal, T quasi-triangular in standard form, values in order of its diagonal. */
export type RealSchur = { readonly Q: Matrix; readonly T: Matrix; readonly values: Complex[] };

/** The same on flat arrays; the rows of qt are the columns of Q. */
export type FlatSchur = { readonly t: Float64Array; readonly qt: Float64Array };

/**
 * Real Schur form by Householder reduction and the Francis iteration.
 *
 * Shapes    A n×n → Q n×n, T n×n, n values
 * Units     T as A
 * Throws    shape-mismatch; not-finite; no-convergence; too-large when an entry of T is beyond the largest double
 * Accuracy  A + E = Q T Q' with Q orthogonal to rounding, |E| ≤ c n ε |A|
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, sections 7.4 and 7.5
 */
export function realSchur(A: Matrix): RealSchur {
  requireSquare("A", A);
  requireFinite("A", A);
  const n = A.rows;
  const a = toFlat(A);
  const shift = safeShift(a);
  const up = powerOfTwo(shift);
  const down = powerOfTwo(-shift);
  const { t, qt } = flatSchur(shift === 0 ? a : a.map((entry) => entry * up), n);
  if (shift !== 0) for (let k = 0; k < t.length; k++) t[k] *= down;
  if (!t.every(Number.isFinite)) throw new NumericalError("too-large", { what: "schur-form", limit: Number.MAX_VALUE });
  return { Q: fromFlat(flatTranspose(qt, n, n), n, n), T: fromFlat(t, n, n), values: schurValues(t, n) };
}

/** For finite entries of ordinary size; leaves a untouched. */
export function flatSchur(a: Float64Array, n: number): FlatSchur {
  const t = workCopy(a);
  const qt = flatIdentity(n);
  reduceToHessenberg(t, n, qt);
  francisIteration(t, n, true, qt);
  // What chasing leaves below are zeros of either sign.
  for (let i = 2; i < n; i++) t.fill(0, i * n, i * n + i - 1);
  return { t, qt };
}
