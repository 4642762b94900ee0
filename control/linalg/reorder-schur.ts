import type { Matrix } from "ml-matrix";
import type { Complex } from "../plant/model";
import { safeShift } from "./balance";
import { flatTranspose, fromFlat, toFlat } from "./flat";
import { timesPowerOfTwo } from "./power-of-two";
import type { RealSchur } from "./real-schur";
import { requireRepresentable } from "./require-representable";
import { blockSize, schurValues } from "./schur-values";
import { swapBlocks } from "./swap-blocks";

export type ReorderedSchur = { readonly Q: Matrix; readonly T: Matrix; readonly values: Complex[]; readonly selected: number };

/**
 * Moves the selected eigenvalues to the top of a real Schur form; `selected` of them then belong to the first columns of Q.
 *
 * Shapes    schur of an n×n matrix → Q n×n, T n×n, n values
 * Units     those of the given form
 * Throws    no-convergence when two blocks are too close to be told apart, so that their swap is not backward stable;
 *           too-large when an entry of T is beyond the largest double
 * Accuracy  Q T Q' moves by at most c n ε |T|; at most n² swaps; a pair goes as a whole when either of it is selected
 * Source    Bai & Demmel, On swapping diagonal blocks in real Schur form, Linear Algebra Appl. 186 (1993) 73-95
 */
export function reorderSchur(schur: RealSchur, select: (value: Complex) => boolean): ReorderedSchur {
  const n = schur.T.rows;
  const t = toFlat(schur.T);
  const qt = flatTranspose(toFlat(schur.Q), n, n);
  const shift = safeShift(t);
  const scale = (by: number) => {
    for (let at = 0; at < t.length; at++) t[at] = timesPowerOfTwo(t[at], by);
  };
  if (shift !== 0) scale(shift);
  const selected = reorderFlat(t, qt, n, ({ re, im }) =>
    select({ re: timesPowerOfTwo(re, -shift), im: timesPowerOfTwo(im, -shift) }),
  );
  if (shift !== 0) scale(-shift);
  requireRepresentable("schur-form", t);
  return { Q: fromFlat(flatTranspose(qt, n, n), n, n), T: fromFlat(t, n, n), values: schurValues(t, n), selected };
}

/** In place on flat arrays (rows of qt are the basis vectors); returns how many eigenvalues were selected. */
export function reorderFlat(t: Float64Array, qt: Float64Array, n: number, select: (value: Complex) => boolean): number {
  const values = schurValues(t, n);
  const blocks: { size: number; chosen: boolean }[] = [];
  for (let k = 0; k < n; ) {
    const size = blockSize(t, n, k);
    blocks.push({ size, chosen: select(values[k]) || (size === 2 && select(values[k + 1])) });
    k += size;
  }
  let place = 0;
  let front = 0;
  for (let b = 0; b < blocks.length; b++) {
    if (!blocks[b].chosen) continue;
    let at = blocks.slice(0, b).reduce((sum, block) => sum + block.size, 0);
    const moving = blocks[b];
    for (let c = b; c > front; c--) {
      const before = blocks[c - 1];
      at -= before.size;
      swapBlocks(t, qt, n, at, before.size, moving.size);
      blocks[c] = before;
      blocks[c - 1] = moving;
    }
    place += moving.size;
    front += 1;
  }
  return place;
}
