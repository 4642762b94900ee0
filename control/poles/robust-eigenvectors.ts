import type { Matrix } from "ml-matrix";
import { singularValues } from "../linalg/singular-values";
import type { Admissible } from "./admissible-vectors";
import { columnsAsMatrix, copyFrame, createFrame, type Frame, frameCost, refreshDuals } from "./eigenvector-frame";
import { lowerConditionPair, raiseDeterminantPair } from "./improve-pair";
import { lowerConditionReal, raiseDeterminantReal } from "./improve-real";
import { startVectors } from "./start-vectors";

const SEEDS = 3;
const MOST_ASCENT_SWEEPS = 40;
const MOST_DESCENT_SWEEPS = 80;
/** Multiplications that all sweeps together may cost, which bounds the time of a plant of any size. */
const WORK_LIMIT = 3e8;
const LEAST_GROWTH = 1.002;
const FIRST_DROP = 1e-3;
const LAST_DROP = 1e-5;

/**
 * Closed-loop eigenvectors that depend on each other as little as the inputs allow: from a few fixed starts the determinant is
 * raised and then |X⁻¹| lowered, column by column. Of the best of either kind the one with the smaller condition is taken.
 *
 * Shapes    one admissible space per real pole or pair → n×n; null when no start gave independent columns
 * Units     scaled states
 * Throws    nothing
 * Accuracy  a local optimum, to about 1e-3 of its condition where the work limit lets it
 * Source    Tits & Yang, IEEE Trans. Autom. Control 41 (1996) 1432-1452; Byers & Nash, Int. J. Control 49 (1989) 97-117
 */
export function robustEigenvectors(spaces: readonly Admissible[], n: number): Frame | null {
  const work = spaces.reduce((sum, { size, pole }) => sum + pole.width * n * n * (size + 4), 0);
  const affordable = Math.max(6, Math.floor(WORK_LIMIT / (work * (SEEDS + 1))));
  const ascents = Math.min(MOST_ASCENT_SWEEPS, Math.floor(affordable / 2));
  const descents = Math.min(MOST_DESCENT_SWEEPS, Math.floor(affordable / 2));
  const free = spaces.some(({ size }) => size > 1);
  let raised: Frame | null = null;
  let lowered: Frame | null = null;
  for (let seed = 0; seed < (free ? SEEDS : 1); seed++) {
    const frame = createFrame(n);
    startVectors(frame, spaces, seed);
    if (!refreshDuals(frame)) continue;
    if (!free) return frame;
    if (!raiseDeterminant(frame, spaces, ascents)) continue;
    if (!raised || frameCost(frame) < frameCost(raised)) raised = copyFrame(frame);
    if (!lowerCondition(frame, spaces, descents, FIRST_DROP)) continue;
    if (!lowered || frameCost(frame) < frameCost(lowered)) lowered = frame;
  }
  if (lowered && !lowerCondition(lowered, spaces, descents, LAST_DROP)) lowered = null;
  return betterConditioned(raised, lowered);
}

function betterConditioned(first: Frame | null, second: Frame | null): Frame | null {
  if (!first || !second) return first ?? second;
  return conditionOf(columnsAsMatrix(first)) < conditionOf(columnsAsMatrix(second)) ? first : second;
}

/** 2-norm condition; Infinity when the smallest singular value is zero. */
export function conditionOf(X: Matrix): number {
  const values = singularValues(X);
  return values[0] / values[values.length - 1];
}

/** False when the columns became dependent. */
function raiseDeterminant(frame: Frame, spaces: readonly Admissible[], sweeps: number): boolean {
  for (let sweep = 0; sweep < sweeps; sweep++) {
    let growth = 1;
    for (const space of spaces) {
      if (space.size === 1) continue;
      const grown = space.pole.width === 1 ? raiseDeterminantReal(frame, space) : raiseDeterminantPair(frame, space);
      growth = Math.max(growth, grown);
    }
    if (!refreshDuals(frame)) return false;
    if (growth < LEAST_GROWTH) break;
  }
  return true;
}

/** False when the columns became dependent. */
function lowerCondition(frame: Frame, spaces: readonly Admissible[], sweeps: number, drop: number): boolean {
  for (let sweep = 0; sweep < sweeps; sweep++) {
    const before = frameCost(frame);
    for (const space of spaces) {
      if (space.size === 1) continue;
      if (space.pole.width === 1) lowerConditionReal(frame, space);
      else lowerConditionPair(frame, space);
    }
    if (!refreshDuals(frame)) return false;
    if (!(frameCost(frame) < before * (1 - drop))) break;
  }
  return true;
}
