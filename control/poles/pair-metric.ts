import type { PairForms } from "./search-scratch";

/**
 * First inverse curvature for the descent of a pair's cost from z: that of its leading term, P⁻¹ det² / (4 (|α|² + |β|²)), in
 * real form.
 *
 * Shapes    z 2k, inverse 2k×2k, overwritten
 * Units     none
 * Throws    nothing; false where it is not positive and finite
 * Accuracy  elimination without exchanges, which a positive definite matrix with unit diagonal or more allows
 * Source    Hessian of `pairCost` without its terms of low rank
 */
export function pairMetric({ size, a, b, pRe, pIm }: PairForms, z: Float64Array, inverse: Float64Array): boolean {
  const k = 2 * size;
  let alphaRe = 0;
  let alphaIm = 0;
  let betaRe = 0;
  let betaIm = 0;
  for (let i = 0; i < size; i++) {
    alphaRe += a[i] * z[i] - a[size + i] * z[size + i];
    alphaIm += a[i] * z[size + i] + a[size + i] * z[i];
    betaRe += b[i] * z[i] - b[size + i] * z[size + i];
    betaIm += b[i] * z[size + i] + b[size + i] * z[i];
  }
  const determinant = 2 * (alphaRe * betaIm - alphaIm * betaRe);
  const lengths = alphaRe * alphaRe + alphaIm * alphaIm + betaRe * betaRe + betaIm * betaIm;
  const factor = (determinant * determinant) / (4 * lengths);
  if (!(factor > 0) || !Number.isFinite(1 / factor)) return false;
  for (let i = 0; i < size; i++) {
    for (let j = 0; j < size; j++) {
      const re = pRe[i * size + j];
      const im = pIm[i * size + j];
      inverse[i * k + j] = re;
      inverse[(size + i) * k + size + j] = re;
      inverse[i * k + size + j] = -im;
      inverse[(size + i) * k + j] = im;
    }
  }
  return invertInPlace(inverse, k, factor);
}

/** Overwrites M by factor M⁻¹. */
function invertInPlace(M: Float64Array, k: number, factor: number): boolean {
  for (let p = 0; p < k; p++) {
    const pivot = M[p * k + p];
    if (!(pivot > 0)) return false;
    M[p * k + p] = 1;
    for (let j = 0; j < k; j++) M[p * k + j] /= pivot;
    for (let i = 0; i < k; i++) {
      if (i === p) continue;
      const multiple = M[i * k + p];
      M[i * k + p] = 0;
      for (let j = 0; j < k; j++) M[i * k + j] -= multiple * M[p * k + j];
    }
  }
  for (let at = 0; at < k * k; at++) M[at] *= factor;
  return Number.isFinite(M[0]);
}
