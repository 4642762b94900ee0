import type { Admissible } from "./admissible-vectors";
import type { Frame } from "./eigenvector-frame";

/** Fractional parts of multiples of the golden ratio and of √2 - 1 lie in general position: no two columns start alike. */
const STRIDES = [0.6180339887498949, 0.41421356237309515, 0.7320508075688772];

/** Fills the columns of the frame with admissible unit vectors that depend on nothing but sizes and the seed. */
export function startVectors({ n, columns }: Frame, spaces: readonly Admissible[], seed: number): void {
  let drawn = 0;
  const next = () => {
    drawn++;
    const spread = drawn * STRIDES[seed % STRIDES.length] + drawn * drawn * 0.0137;
    return spread - Math.floor(spread) - 0.5;
  };
  for (const { size, re, im, pole } of spaces) {
    const zRe = Float64Array.from({ length: size }, next);
    const zIm = Float64Array.from({ length: size }, () => (pole.width === 2 ? next() : 0));
    const length = Math.sqrt(zRe.reduce((sum, x, k) => sum + x * x + zIm[k] * zIm[k], 0));
    const factor = (pole.width === 2 ? Math.SQRT2 : 1) / length;
    for (let i = 0; i < n; i++) {
      let u = 0;
      let v = 0;
      for (let k = 0; k < size; k++) {
        u += re[i * size + k] * zRe[k] - im[i * size + k] * zIm[k];
        v += re[i * size + k] * zIm[k] + im[i * size + k] * zRe[k];
      }
      columns[pole.column * n + i] = u * factor;
      if (pole.width === 2) columns[(pole.column + 1) * n + i] = v * factor;
    }
  }
}
