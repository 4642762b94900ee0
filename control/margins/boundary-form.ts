import { NumericalError } from "../errors";
import { modulus } from "../linalg/complex";
import { flatTranspose } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { powerOfTwo, timesPowerOfTwo } from "../linalg/power-of-two";
import type { FrequencySystem } from "./prepare-frequency";

/**
 * The system as a continuous one whose imaginary axis is the stability boundary: a, b, c, d row-major with
 * G = 2^size (c (2^rate i v - a)⁻¹ b + d) at the coordinate v of the boundary.
 */
export type BoundaryForm = {
  readonly n: number;
  readonly m: number;
  readonly p: number;
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly c: Float64Array;
  readonly d: Float64Array;
  readonly rate: number;
  /** Sizes of the poles, in the units of a. */
  readonly poleSizes: readonly number[];
};

/**
 * Continuous systems as they are; sampled ones through z = (1 + s)/(1 - s), which keeps every gain.
 *
 * Throws    singular when the sampled system has a pole at z = -1
 * Accuracy  sampled: c n ε times the condition of A + I; only places to look at are computed from it, never a gain
 * Source    Glover, Int. J. Control 39 (1984) 1115-1193, for the bilinear transformation (from memory)
 */
export function boundaryForm({ n, m, p, h, b, c, d, period, rate, poles }: FrequencySystem): BoundaryForm {
  if (period === null) {
    const poleSizes = poles.map((pole) => timesPowerOfTwo(modulus(pole), rate));
    return { n, m, p, a: h, b, c, d, rate, poleSizes };
  }
  const unit = powerOfTwo(rate);
  const plus = h.slice();
  const minus = h.slice();
  for (let i = 0; i < n; i++) {
    plus[i * n + i] += unit;
    minus[i * n + i] -= unit;
  }
  const factors = factorLu(plus, n);
  if (factors.zeroPivot >= 0) throw new NumericalError("singular", { matrix: "A + I", row: factors.zeroPivot });
  const newB = solveLu(factors, b, m);
  const transposed = factorLu(flatTranspose(plus, n, n), n);
  const newC = flatTranspose(solveLu(transposed, flatTranspose(c, p, n), p), n, p);
  const newD = d.slice();
  for (let i = 0; i < p; i++) {
    for (let k = 0; k < n; k++) for (let j = 0; j < m; j++) newD[i * m + j] -= c[i * n + k] * newB[k * m + j];
    for (let k = 0; k < n; k++) newC[i * n + k] *= 2 * unit;
  }
  const poleSizes = poles.map(({ re, im }) => modulus({ re: re - 1, im }) / modulus({ re: re + 1, im }));
  return { n, m, p, a: solveLu(factors, minus, n), b: newB, c: newC, d: newD, rate: 0, poleSizes };
}
