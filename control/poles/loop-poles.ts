import type { Matrix } from "ml-matrix";
import { balance } from "../linalg/balance";
import { toFlat } from "../linalg/flat";
import { powerOfTwo } from "../linalg/power-of-two";
import { workArray } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import type { WideComplex } from "./hyman-step";
import { widePoles } from "./wide-poles";
import { addMultiple, type WideRows } from "./wide-rows";

/**
 * Poles of A - B K for these very doubles, product and eigenvalues with some 32 digits: one from each wanted pole.
 *
 * Shapes    A n×n, B n×m, K m×n, n wanted poles, pairs adjacent with im > 0 first → n, or null when they were not all found
 * Units     those of the plant's plane
 * Throws    nothing
 * Accuracy  as `widePoles`
 * Source    as `widePoles`
 */
export function loopPoles(A: Matrix, B: Matrix, K: Matrix, wanted: readonly Complex[]): WideComplex[] | null {
  const n = A.rows;
  const loop: WideRows = { hi: toFlat(A), lo: workArray(n * n) };
  const gain: WideRows = { hi: toFlat(K), lo: workArray(K.rows * n) };
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < K.rows; j++) addMultiple(loop, i * n, gain, j * n, n, 1, { hi: -B.get(i, j), lo: 0 });
  }
  const { matrix, order, scale, shift } = balance(loop.hi, n);
  const factor = powerOfTwo(shift);
  const lo = workArray(n * n);
  for (let i = 0; i < n; i++) {
    for (let j = 0; j < n; j++) lo[i * n + j] = ((loop.lo[order[i] * n + order[j]] * factor) / scale[i]) * scale[j];
  }
  const starts = wanted.map(({ re, im }) => ({ re: re * factor, im: im * factor }));
  const found = widePoles({ hi: matrix, lo }, n, starts);
  const back = powerOfTwo(-shift);
  return (
    found?.map(({ re, im, reLow, imLow }) => ({ re: re * back, im: im * back, reLow: reLow * back, imLow: imLow * back })) ?? null
  );
}
