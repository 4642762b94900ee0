import type { Complex } from "../plant/model";

/** Size of the diagonal block that starts at k of a quasi-triangular t: 2 where the entry below the diagonal is not zero. */
export function blockSize(t: Float64Array, n: number, k: number): 1 | 2 {
  return k + 1 < n && t[(k + 1) * n + k] !== 0 ? 2 : 1;
}

/** Eigenvalues of a real Schur form in standard form, in order of the diagonal; a pair has im > 0 first. */
export function schurValues(t: Float64Array, n: number): Complex[] {
  const values: Complex[] = [];
  for (let k = 0; k < n; ) {
    const re = t[k * n + k];
    if (blockSize(t, n, k) === 1) {
      values.push({ re, im: 0 });
      k += 1;
    } else {
      const im = Math.sqrt(Math.abs(t[k * n + k + 1])) * Math.sqrt(Math.abs(t[(k + 1) * n + k]));
      values.push({ re, im }, { re, im: -im });
      k += 2;
    }
  }
  return values;
}
