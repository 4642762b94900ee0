import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { pythagoras, toFlat } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Complex } from "../plant/model";
import { modeDistance } from "../structure/mode-distance";
import { analyseReach } from "../structure/reach-analysis";
import { evenStateUnits } from "./state-units";
import type { WantedPole } from "./wanted-poles";

export type KeptModes = {
  /** The wanted poles, those that stand for a mode no input moves put exactly there. */
  readonly blocks: readonly WantedPole[];
  /** The modes no input moves. */
  readonly fixed: readonly Complex[];
};

/**
 * Sees to it that every mode the inputs do not move is among the wanted poles. A wanted pole within √ε of such a mode,
 * relative to its size, is taken to mean that mode.
 *
 * Shapes    A n×n, B n×m, blocks covering n poles
 * Units     those of the plant's plane
 * Throws    not-controllable { pole, state, distance } with the mode, the state that has most of it, and how far
 *           [A - pole I, B] is from losing rank, over the norm of [A B]; no-convergence
 * Accuracy  a mode counts as not moved when that holds for a pair within 4 (n + m) ε of the given one
 * Source    Hautus 1969; Rosenbrock 1970: decoupling zeros stay under every feedback
 */
export function keepFixedModes(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): KeptModes {
  const n = A.rows;
  const m = B.columns;
  const a = toFlat(A);
  const b = toFlat(B);
  const values = eigenvalues(A);
  const { reached } = analyseReach(a, b, n, m, values);
  const kept = [...blocks];
  const used = new Set<number>();
  const fixed: Complex[] = [];
  values.forEach((value, k) => {
    if (reached[k]) return;
    fixed.push(value);
    if (value.im < 0) return;
    const place = nearestBlock(blocks, value, used, a);
    if (place < 0) throw new NumericalError("not-controllable", describeFixedMode(A, B, value));
    used.add(place);
    const { re, im } = blocks[place];
    const exact = modulus({ re: re - value.re, im: im - value.im }) <= 8 * n * Number.EPSILON * flatNorm(a);
    if (!exact) kept[place] = { ...blocks[place], re: value.re, im: value.im };
  });
  return { blocks: kept, fixed };
}

function nearestBlock(blocks: readonly WantedPole[], value: Complex, used: ReadonlySet<number>, a: Float64Array): number {
  const tolerance = Math.sqrt(Number.EPSILON) * modulus(value) + 64 * Number.EPSILON * flatNorm(a);
  let nearest = -1;
  let least = tolerance;
  blocks.forEach(({ re, im, width }, place) => {
    const distance = modulus({ re: re - value.re, im: im - value.im });
    if (used.has(place) || width !== (value.im === 0 ? 1 : 2) || !(distance <= least)) return;
    nearest = place;
    least = distance;
  });
  return nearest;
}

/** A mode that no input moves: its pole, the state with the largest part of it in balanced units, and how far it is from moving. */
export function describeFixedMode(A: Matrix, B: Matrix, pole: Complex): { pole: Complex; state: number; distance: number } {
  const n = A.rows;
  const m = B.columns;
  const a = toFlat(A);
  const b = toFlat(B);
  const { relative, normRatio, re, im } = modeDistance(a, b, n, m, pole);
  const units = evenStateUnits(a, b, n, m);
  let state = 0;
  let most = -1;
  for (let i = 0; i < n; i++) {
    const part = pythagoras(re[i], im[i]) * units[i];
    if (part > most) {
      most = part;
      state = i;
    }
  }
  const rounding = 4 * n * Number.EPSILON * flatNorm(a);
  const settled = { re: Math.abs(pole.re) <= rounding ? 0 : pole.re, im: Math.abs(pole.im) <= rounding ? 0 : pole.im };
  return { pole: settled, state, distance: relative * normRatio };
}
