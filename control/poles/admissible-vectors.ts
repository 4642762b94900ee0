import { fromFlat, toFlat } from "../linalg/flat";
import { orthonormalBasis } from "../linalg/orthogonal";
import { workArray } from "../linalg/work-array";
import { type ComplexVectors, complementBasis } from "./complement-basis";
import type { ScaledPlant } from "./scale-plant";
import type { WantedPole } from "./wanted-poles";

/** Orthonormal bases, row-major, of what the inputs reach (n×rank) and do not reach (n×(n - rank)). */
export type InputRange = { readonly rank: number; readonly reached: Float64Array; readonly unreached: Float64Array };

/** Eigenvectors that a wanted pole may have: every combination of the `size` orthonormal columns, row-major n×size. */
export type Admissible = {
  readonly pole: WantedPole;
  readonly size: number;
  readonly re: Float64Array;
  readonly im: Float64Array;
};

/** Range of B, with inputs that do nothing or repeat others left out. */
export function inputRange({ n, m, b }: ScaledPlant): InputRange {
  const { range, complement, rank } = orthonormalBasis(fromFlat(b, n, m));
  return { rank, reached: toFlat(range), unreached: toFlat(complement) };
}

/**
 * Eigenvectors that feedback can give to a wanted pole: the kernel of U'(A - pole I), U spanning what the inputs do not reach.
 * It has rank B dimensions, and one more for each mode at that very pole that no input moves.
 *
 * Shapes    A n×n, U n×(n - rank B) → n×size
 * Units     scaled states
 * Throws    nothing
 * Accuracy  orthonormal; the kernel of a matrix within c n ε of the one given
 * Source    Kautsky, Nichols & Van Dooren, Int. J. Control 41 (1985) 1129-1155, theorem 3
 */
export function admissibleVectors({ n, a }: ScaledPlant, { rank, unreached }: InputRange, pole: WantedPole): Admissible {
  const count = n - rank;
  const re = workArray(count * n);
  const im = workArray(count * n);
  let norm = Math.abs(pole.re) + pole.im;
  for (let c = 0; c < count; c++) {
    const at = c * n;
    for (let i = 0; i < n; i++) {
      const u = unreached[i * count + c];
      if (u === 0) continue;
      for (let j = 0; j < n; j++) re[at + j] += u * a[i * n + j];
      re[at + i] -= pole.re * u;
      im[at + i] += pole.im * u;
    }
    for (let j = 0; j < n; j++) norm = Math.max(norm, Math.abs(re[at + j]));
  }
  return transposed(pole, complementBasis({ re, im, count, length: n }, 4 * n * Number.EPSILON * norm));
}

function transposed(pole: WantedPole, { re, im, count, length }: ComplexVectors): Admissible {
  const rowsRe = workArray(count * length);
  const rowsIm = workArray(count * length);
  for (let c = 0; c < count; c++) {
    for (let i = 0; i < length; i++) {
      rowsRe[i * count + c] = re[c * length + i];
      rowsIm[i * count + c] = im[c * length + i];
    }
  }
  return { pole, size: count, re: rowsRe, im: rowsIm };
}
