/**
 * Inverse of a Hermitian positive definite matrix, over its own entries; false when it is not definite.
 *
 * Shapes    re, im k×k row-major, both triangles given, overwritten
 * Accuracy  c k ε times the condition
 * Source    Golub & Van Loan, Matrix Computations, 4th ed. 2013, section 4.2
 */
export function invertHermitian(re: Float64Array, im: Float64Array, k: number): boolean {
  if (!factor(re, im, k)) return false;
  invertTriangle(re, im, k);
  // (L L*)⁻¹ = W* W for W = L⁻¹, written from the top: entry (i, j) reads only rows from max(i, j) on.
  for (let i = 0; i < k; i++) {
    for (let j = 0; j <= i; j++) {
      let sumRe = 0;
      let sumIm = 0;
      for (let l = i; l < k; l++) {
        const [ar, ai] = [re[l * k + i], -im[l * k + i]];
        const [br, bi] = [re[l * k + j], im[l * k + j]];
        sumRe += ar * br - ai * bi;
        sumIm += ar * bi + ai * br;
      }
      re[i * k + j] = sumRe;
      im[i * k + j] = i === j ? 0 : sumIm;
    }
  }
  for (let i = 0; i < k; i++) {
    for (let j = 0; j < i; j++) {
      re[j * k + i] = re[i * k + j];
      im[j * k + i] = 0 - im[i * k + j];
    }
  }
  return true;
}

/** Lower triangle becomes the Cholesky factor, with a real diagonal. */
function factor(re: Float64Array, im: Float64Array, k: number): boolean {
  for (let j = 0; j < k; j++) {
    let pivot = re[j * k + j];
    for (let l = 0; l < j; l++) pivot -= re[j * k + l] * re[j * k + l] + im[j * k + l] * im[j * k + l];
    if (!(pivot > 0) || !Number.isFinite(pivot)) return false;
    const root = Math.sqrt(pivot);
    re[j * k + j] = root;
    im[j * k + j] = 0;
    for (let i = j + 1; i < k; i++) {
      let sumRe = re[i * k + j];
      let sumIm = im[i * k + j];
      for (let l = 0; l < j; l++) {
        sumRe -= re[i * k + l] * re[j * k + l] + im[i * k + l] * im[j * k + l];
        sumIm -= im[i * k + l] * re[j * k + l] - re[i * k + l] * im[j * k + l];
      }
      re[i * k + j] = sumRe / root;
      im[i * k + j] = sumIm / root;
    }
  }
  return true;
}

function invertTriangle(re: Float64Array, im: Float64Array, k: number): void {
  for (let j = 0; j < k; j++) {
    re[j * k + j] = 1 / re[j * k + j];
    for (let i = j + 1; i < k; i++) {
      let sumRe = 0;
      let sumIm = 0;
      for (let l = j; l < i; l++) {
        sumRe -= re[i * k + l] * re[l * k + j] - im[i * k + l] * im[l * k + j];
        sumIm -= re[i * k + l] * im[l * k + j] + im[i * k + l] * re[l * k + j];
      }
      re[i * k + j] = sumRe / re[i * k + i];
      im[i * k + j] = sumIm / re[i * k + i];
    }
  }
}
