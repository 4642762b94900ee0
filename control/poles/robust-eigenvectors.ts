import type { Admissible } from "./admissible-vectors";
import { conditionEstimate } from "./condition-estimate";
import { copyInto, createFrame, type Frame, frameCost, refreshDuals } from "./eigenvector-frame";
import { lowerConditionPair, raiseDeterminantPair } from "./improve-pair";
import { lowerConditionReal, raiseDeterminantReal } from "./improve-real";
import { createScratch, type Scratch } from "./search-scratch";
import { startVectors } from "./start-vectors";

const SEEDS = 3;
/** Sweeps from every start before the best of them is taken on, by either way. */
const FIRST_ASCENTS = 12;
const FIRST_DESCENTS = 3;
const LAST_ASCENTS = 30;
/** Share of |X⁻¹|² that a sweep must still take off, and how many there are: with two inputs they are cheap, but gain slowly. */
const LAST_DESCENTS = { narrow: 200, wide: 40 };
const LEAST_DROP = { narrow: 2e-5, wide: 2e-4 };
const FIRST_GROWTH = 1.05;
const LAST_GROWTH = 1.002;
/** Multiplications that all sweeps together may cost, which bounds the time of a plant of any size. */
const WORK_LIMIT = 3e8;
/** Rank-one changes of the inverse gather rounding; a new inversion removes it. */
const SWEEPS_PER_REFRESH = 4;

type Search = { readonly spaces: readonly Admissible[]; readonly rooms: readonly Scratch[] };

/**
 * Closed-loop eigenvectors that depend on each other as little as the inputs allow: from a few fixed starts the determinant is
 * raised and then |X⁻¹| lowered a little, column by column. The best of them is taken on either way until it hardly gains any
 * more, and of the two ends the one with the smaller condition is taken.
 *
 * Shapes    one admissible space per real pole or pair → n×n; null when no start gave independent columns
 * Units     scaled states
 * Throws    nothing
 * Accuracy  a local optimum, to about 1e-2 of its condition where the work limit lets it
 * Source    Tits & Yang, IEEE Trans. Autom. Control 41 (1996) 1432-1452; Byers & Nash, Int. J. Control 49 (1989) 97-117
 */
export function robustEigenvectors(spaces: readonly Admissible[], n: number): Frame | null {
  const work = spaces.reduce((sum, { size, pole }) => sum + pole.width * n * n * (size + 4), 0);
  const affordable = Math.max(6, Math.floor(WORK_LIMIT / work));
  const width = spaces.every(({ size }) => size <= 2) ? "narrow" : "wide";
  const search = { spaces, rooms: roomsFor(spaces, n) };
  const free = spaces.some(({ size }) => size > 1);
  let frame = createFrame(n);
  let raised = createFrame(n);
  let start = createFrame(n);
  let lowered: Frame | null = null;
  for (let seed = 0; seed < (free ? SEEDS : 1); seed++) {
    startVectors(frame, spaces, seed);
    if (!refreshDuals(frame)) continue;
    if (!free) return frame;
    if (!raiseDeterminant(frame, search, Math.min(FIRST_ASCENTS, affordable), FIRST_GROWTH)) continue;
    copyInto(frame, start);
    if (!lowerCondition(frame, search, FIRST_DESCENTS, LEAST_DROP[width])) continue;
    if (lowered && frameCost(lowered) <= frameCost(frame)) continue;
    [lowered, frame] = [frame, lowered ?? createFrame(n)];
    [raised, start] = [start, raised];
  }
  if (!lowered) return null;
  const descents = Math.min(LAST_DESCENTS[width], Math.ceil(affordable / 4));
  const descended = lowerCondition(lowered, search, descents, LEAST_DROP[width]);
  const ascended = raiseDeterminant(raised, search, Math.min(LAST_ASCENTS, affordable), LAST_GROWTH);
  if (!descended || !ascended) return descended ? lowered : ascended ? raised : null;
  return conditionEstimate(raised) < conditionEstimate(lowered) ? raised : lowered;
}

/** One room for each size of space, in the order of the spaces. */
function roomsFor(spaces: readonly Admissible[], n: number): Scratch[] {
  const made = new Map<number, Scratch>();
  return spaces.map(({ size }) => {
    const room = made.get(size) ?? createScratch(n, size);
    made.set(size, room);
    return room;
  });
}

/** False when the columns became dependent. */
function raiseDeterminant(frame: Frame, { spaces, rooms }: Search, sweeps: number, least: number): boolean {
  for (let sweep = 0; sweep < sweeps; sweep++) {
    let growth = 1;
    spaces.forEach((space, k) => {
      if (space.size === 1) return;
      const raise = space.pole.width === 1 ? raiseDeterminantReal : raiseDeterminantPair;
      growth = Math.max(growth, raise(frame, space, rooms[k]));
    });
    if (growth < least) break;
    if (sweep % SWEEPS_PER_REFRESH === SWEEPS_PER_REFRESH - 1 && !refreshDuals(frame)) return false;
  }
  return refreshDuals(frame);
}

/** False when the columns became dependent. */
function lowerCondition(frame: Frame, { spaces, rooms }: Search, sweeps: number, drop: number): boolean {
  for (let sweep = 0; sweep < sweeps; sweep++) {
    const before = frameCost(frame);
    spaces.forEach((space, k) => {
      if (space.size === 1) return;
      const lower = space.pole.width === 1 ? lowerConditionReal : lowerConditionPair;
      lower(frame, space, rooms[k]);
    });
    if (!(frameCost(frame) < before * (1 - drop))) break;
    if (sweep % SWEEPS_PER_REFRESH === SWEEPS_PER_REFRESH - 1 && !refreshDuals(frame)) return false;
  }
  return refreshDuals(frame);
}
