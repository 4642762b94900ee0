import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import type { Complex } from "../plant/model";
import { balance } from "./balance";
import { toFlat } from "./flat";
import { francisIteration } from "./francis";
import { reduceToHessenberg } from "./hessenberg";
import { powerOfTwo } from "./power-of-two";
import { requireFinite, requireSquare } from "./require";
import { schurValues } from "./schur-values";

/**
 * Eigenvalues of a real square matrix, sorted by real part, then by size of the imaginary part.
 *
 * Shapes    A n×n → n values; conjugate pairs are exactly conjugate and adjacent, im > 0 first
 * Units     those of A
 * Throws    shape-mismatch; not-finite; no-convergence; too-large when a value is beyond the largest double
 * Accuracy  exact for A + E, |E| ≤ c n ε |D⁻¹AD| after balancing; zeros and poles of separate blocks stay exact
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.5; balancing after Parlett & Reinsch 1969
 */
export function eigenvalues(A: Matrix): Complex[] {
  requireSquare("A", A);
  requireFinite("A", A);
  return flatEigenvalues(toFlat(A), A.rows);
}

/** The same for finite row-major entries, which are left untouched. */
export function flatEigenvalues(a: Float64Array, n: number): Complex[] {
  const { matrix, shift } = balance(a, n);
  reduceToHessenberg(matrix, n, null);
  francisIteration(matrix, n, false, null);
  const values = schurValues(matrix, n);
  return sortedOrder(values).map((k) => unshift(values[k], shift));
}

/** Places of the values in the order of this module; both of a pair stay together. */
export function sortedOrder(values: readonly Complex[]): number[] {
  const starts: number[] = [];
  for (let k = 0; k < values.length; k += values[k].im === 0 ? 1 : 2) starts.push(k);
  starts.sort((i, j) => values[i].re - values[j].re || values[i].im - values[j].im || i - j);
  return starts.flatMap((k) => (values[k].im === 0 ? [k] : [k, k + 1]));
}

/** Undoes the power of two taken out by balancing. */
export function unshift({ re, im }: Complex, shift: number): Complex {
  const factor = powerOfTwo(-shift);
  const value = { re: re * factor + 0, im: im * factor + 0 };
  if (!Number.isFinite(value.re) || !Number.isFinite(value.im))
    throw new NumericalError("too-large", { what: "eigenvalue", limit: Number.MAX_VALUE });
  return value;
}
