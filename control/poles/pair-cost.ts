import type { PairForms } from "./search-scratch";

/**
 * The part of |X⁻¹|² that turns with a pair's eigenvector S z, and its gradient: with α = a z, β = b z, τ = zᴴP z, ρ = z'R z,
 * 2 ((|α|² + |β|²) τ - Re(ρ̄ (α² + β²))) / (2 Im(ᾱ β))².
 * It does not change when z is multiplied by any complex number.
 *
 * Shapes    z, gradient and the two products 2k reals: real parts, then imaginary parts; all but z are overwritten
 * Units     none
 * Throws    nothing; Infinity where the pair's columns would be dependent
 * Accuracy  rounding of the formula
 * Source    block inverse of [√2 Re x, √2 Im x] beside fixed columns
 */
export function pairCost(
  forms: PairForms,
  z: Float64Array,
  gradient: Float64Array,
  [pz, rz]: readonly [Float64Array, Float64Array],
): number {
  const { size, a, b } = forms;
  const alpha = rowTimes(a, z, size);
  const beta = rowTimes(b, z, size);
  const determinant = 2 * (alpha.re * beta.im - alpha.im * beta.re);
  if (!(Math.abs(determinant) > 0)) return Number.POSITIVE_INFINITY;
  squareTimes(forms.pRe, forms.pIm, z, size, pz);
  squareTimes(forms.rRe, forms.rIm, z, size, rz);
  let tau = 0;
  let rhoRe = 0;
  let rhoIm = 0;
  for (let k = 0; k < size; k++) {
    tau += z[k] * pz[k] + z[size + k] * pz[size + k];
    rhoRe += z[k] * rz[k] - z[size + k] * rz[size + k];
    rhoIm += z[k] * rz[size + k] + z[size + k] * rz[k];
  }
  const lengths = alpha.re * alpha.re + alpha.im * alpha.im + beta.re * beta.re + beta.im * beta.im;
  const sigmaRe = alpha.re * alpha.re - alpha.im * alpha.im + beta.re * beta.re - beta.im * beta.im;
  const sigmaIm = 2 * (alpha.re * alpha.im + beta.re * beta.im);
  const top = lengths * tau - rhoRe * sigmaRe - rhoIm * sigmaIm;
  const value = (2 * top) / (determinant * determinant);
  const outer = 4 / (determinant * determinant);
  const inner = (-4 * value) / determinant;
  for (let k = 0; k < size; k++) {
    const aRe = a[k];
    const aIm = -a[size + k];
    const bRe = b[k];
    const bIm = -b[size + k];
    // τ (āα + b̄β) + (|α|²+|β|²) P z - σ conj(R z) - ρ conj(a α + b β), all of it twice a Wirtinger derivative
    const fromRowsRe = aRe * alpha.re - aIm * alpha.im + bRe * beta.re - bIm * beta.im;
    const fromRowsIm = aRe * alpha.im + aIm * alpha.re + bRe * beta.im + bIm * beta.re;
    const turnedRe = aRe * alpha.re + aIm * alpha.im + bRe * beta.re + bIm * beta.im;
    const turnedIm = aIm * alpha.re - aRe * alpha.im + bIm * beta.re - bRe * beta.im;
    const topRe =
      tau * fromRowsRe + lengths * pz[k] - sigmaRe * rz[k] - sigmaIm * rz[size + k] - rhoRe * turnedRe + rhoIm * turnedIm;
    const topIm =
      tau * fromRowsIm + lengths * pz[size + k] - sigmaIm * rz[k] + sigmaRe * rz[size + k] - rhoRe * turnedIm - rhoIm * turnedRe;
    // -i (ā β - b̄ α)
    const turnRe = aRe * beta.im + aIm * beta.re - bRe * alpha.im - bIm * alpha.re;
    const turnIm = -(aRe * beta.re - aIm * beta.im - bRe * alpha.re + bIm * alpha.im);
    gradient[k] = outer * topRe + inner * turnRe;
    gradient[size + k] = outer * topIm + inner * turnIm;
  }
  return value;
}

function rowTimes(row: Float64Array, z: Float64Array, size: number): { re: number; im: number } {
  let re = 0;
  let im = 0;
  for (let k = 0; k < size; k++) {
    re += row[k] * z[k] - row[size + k] * z[size + k];
    im += row[k] * z[size + k] + row[size + k] * z[k];
  }
  return { re, im };
}

/** M z for a complex square M given by parts, into `out`. */
function squareTimes(mRe: Float64Array, mIm: Float64Array, z: Float64Array, size: number, out: Float64Array): void {
  for (let k = 0, at = 0; k < size; k++) {
    let re = 0;
    let im = 0;
    for (let l = 0; l < size; l++, at++) {
      re += mRe[at] * z[l] - mIm[at] * z[size + l];
      im += mRe[at] * z[size + l] + mIm[at] * z[l];
    }
    out[k] = re;
    out[size + k] = im;
  }
}
