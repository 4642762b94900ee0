import { factorLu, solveLu } from "../linalg/lu";
import { timesPowerOfTwo } from "../linalg/power-of-two";
import type { Complex } from "../plant/model";
import type { BoundaryForm } from "./boundary-form";
import { invertedValues } from "./inverted-values";
import { rising } from "./partition";
import { searchShifts } from "./search-shifts";

/** |L| = 1 (so that Re S = 1/2), or L real (so that Im S = 0). */
export type CrossingKind = "gain" | "phase";

/**
 * Coordinates of the boundary suggested by the zeros of S(s) + S(-s) - 1 (gain) or of S(s) - S(-s) (phase): their sizes and
 * imaginary parts, whether they lie on the axis or not. With λ = s² these are zeros of f (λ - A²)⁻¹ b + e with f = 2 c A and
 * e = 2 d - 1, or f = c and e = 0: eigenvalues of a matrix of order n, inverted about three values σ² so that slow and fast
 * ones are found alike, without ever forming A².
 *
 * Shapes    one input, one output → rising, all positive
 * Throws    no-convergence
 * Accuracy  of λ: c n ε (|λ|/σ² + σ²/|λ|) times the condition of the eigenvalue, for the best of the three σ
 * Source    the inverted pencil of Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 7.7
 */
export function axisPlaces(form: BoundaryForm, kind: CrossingKind, size: number): number[] {
  const { n, a, b, d, rate } = form;
  const c = form.c.map((entry) => timesPowerOfTwo(entry, size));
  const f = kind === "phase" ? c : rowTimes(c, a, n).map((entry) => 2 * entry);
  const direct = kind === "phase" ? 0 : 2 * timesPowerOfTwo(d[0], size) - 1;
  const places: number[] = [];
  for (const sigma of searchShifts(form.poleSizes)) {
    for (const { re, im } of zerosAbout(a, b, f, direct, n, sigma)) {
      const length = Math.sqrt(re * re + im * im);
      places.push(Math.sqrt(length), Math.sqrt(Math.max(0, (length - re) / 2)));
    }
  }
  return rising(places.map((v) => timesPowerOfTwo(v, -rate)).filter((v) => v > 0 && Number.isFinite(v)));
}

/** λ of the zeros, from the eigenvalues of N = R + R b f R / g with R = (A² - σ²)⁻¹ and g the value at λ = σ². */
function zerosAbout(a: Float64Array, b: Float64Array, f: Float64Array, direct: number, n: number, sigma: number): Complex[] {
  const minus = factorLu(plusUnit(a, n, -sigma), n);
  const plus = factorLu(plusUnit(a, n, sigma), n);
  if (minus.zeroPivot >= 0 || plus.zeroPivot >= 0) return [];
  const unit = plusUnit(new Float64Array(n * n), n, 1);
  const R = solveLu(minus, solveLu(plus, unit, n), n);
  const Rb = solveLu(minus, solveLu(plus, b, 1), 1);
  const fR = rowTimes(f, R, n);
  let g = direct;
  for (let k = 0; k < n; k++) g -= f[k] * Rb[k];
  if (g === 0) return [];
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) R[i * n + j] += (Rb[i] * fR[j]) / g;
  if (!R.every(Number.isFinite)) return [];
  return invertedValues(R, n).map(({ re, im }) => ({ re: sigma * sigma + re, im }));
}

function plusUnit(a: Float64Array, n: number, amount: number): Float64Array {
  const shifted = a.slice();
  for (let i = 0; i < n; i++) shifted[i * n + i] += amount;
  return shifted;
}

function rowTimes(row: Float64Array, matrix: Float64Array, n: number): Float64Array {
  const product = new Float64Array(n);
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) product[j] += row[i] * matrix[i * n + j];
  return product;
}
