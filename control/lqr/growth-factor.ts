/**
 * e^x for 0 ≤ x ≤ 30 from additions, products and divisions alone, so that every engine returns the same bits.
 *
 * Accuracy  relative error below 1e-12: Taylor's series at x / 2^k ≤ 1/2, squared k times
 */
export function growthFactor(x: number): number {
  let reduced = x;
  let squarings = 0;
  while (reduced > 0.5 && squarings < 64) {
    reduced /= 2;
    squarings += 1;
  }
  let sum = 1;
  for (let k = 18; k >= 1; k--) sum = 1 + (reduced / k) * sum;
  for (let k = 0; k < squarings; k++) sum *= sum;
  return sum;
}
