import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { fromFlat, toFlat } from "../linalg/flat";
import { type Admissible, admissibleVectors, type InputRange, inputRange } from "./admissible-vectors";
import { chainPlans } from "./chain-plan";
import { chainVectors } from "./chain-vectors";
import { dyadicGain, scaledSingleInputGain } from "./dyadic-gain";
import { gainFromVectors } from "./gain-from-vectors";
import { robustEigenvectors } from "./robust-eigenvectors";
import { type ScaledPlant, scalePlant } from "./scale-plant";
import { evenStateUnits } from "./state-units";
import { type Placed, type PlacementCheck, verifyPlacement } from "./verify-placement";
import { samePole, type WantedPole } from "./wanted-poles";

export type Candidate = {
  readonly K: Matrix;
  readonly method: string;
  readonly check: PlacementCheck;
  /** Some wanted pole has more eigenvectors to choose from than there are inputs: a mode there may be one no input moves. */
  readonly spare: boolean;
};

const SINGLE_INPUT = "one input: row of the wanted polynomial in double-double";
const ONE_DIRECTION = "one direction of the inputs: row of the wanted polynomial in double-double";

const CHAINS = "shortest chains of principal vectors, of least condition";
const MOST_PLANS = 12;

/** Beyond this condition or error in the plant's own units, the same is tried in balanced ones. */
const DOUBTFUL = Math.sqrt(Number.EPSILON);
const LIKE_UNITS = 4;
/** Within these a placement is its own proof that the inputs move every mode. */
const PROVEN_ERROR = 1e-10;
const PROVEN_CONDITION = 1e6;

/**
 * First try at a placement, without asking whether the inputs move every mode, and whether its poles leave that beyond doubt:
 * a mode that no input moves stays where it is, so that it shows as an error, as dependent eigenvectors or as a spare one.
 *
 * Shapes    A n×n, B n×m, blocks covering n poles
 * Units     entries and poles of like size, or they may not be squared
 * Throws    no-convergence
 * Accuracy  the check's
 */
export function firstPlacement(
  A: Matrix,
  B: Matrix,
  blocks: readonly WantedPole[],
): { found: Candidate | null; proven: boolean } {
  const found = B.columns === 1 ? singleInputCandidate(A, B, blocks) : robustCandidate(A, B, blocks, false);
  if (!found) return { found, proven: false };
  const { exact, poleError, conditioning } = found.check;
  const proven = !found.spare && exact && poleError <= PROVEN_ERROR && conditioning !== null && conditioning <= PROVEN_CONDITION;
  return { found, proven };
}

/**
 * The best gain for a plant whose inputs move every mode, `first` being what was tried before; its check says whether it holds.
 *
 * Shapes    A n×n, B n×m, blocks covering n poles; `dependent`: poles repeated beyond what independent eigenvectors allow may
 *           share chains of principal vectors, and poles that only lie together may be moved along one direction of the inputs
 * Units     entries and poles of like size, or they may not be squared
 * Throws    no-convergence
 * Accuracy  the check's
 */
export function freePlacement(
  A: Matrix,
  B: Matrix,
  blocks: readonly WantedPole[],
  first: Candidate | null,
  dependent: boolean,
): Candidate | null {
  const candidates = B.columns === 1 ? [first] : robustCandidates(A, B, blocks, first);
  if (dependent && B.columns > 1 && !candidates.some((found) => found?.check.holds)) {
    candidates.push(chainCandidate(A, B, blocks) ?? dyadicCandidate(A, B, blocks));
  }
  return best(candidates);
}

/** The same with eigenvectors chosen for their independence, which also keeps modes that no input moves. */
export function robustPlacement(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate | null {
  return best(robustCandidates(A, B, blocks, robustCandidate(A, B, blocks, false)));
}

function robustCandidates(A: Matrix, B: Matrix, blocks: readonly WantedPole[], first: Candidate | null): (Candidate | null)[] {
  const { check } = first ?? {};
  const good = check?.holds && check.poleError <= DOUBTFUL && (check.conditioning ?? Number.POSITIVE_INFINITY) <= 1 / DOUBTFUL;
  return good || !unitsDiffer(A, B) ? [first] : [first, robustCandidate(A, B, blocks, true)];
}

/** Whether balancing would change anything worth the time of a second search. */
function unitsDiffer(A: Matrix, B: Matrix): boolean {
  const units = evenStateUnits(toFlat(A), toFlat(B), A.rows, B.columns);
  return Math.max(...units) > LIKE_UNITS * Math.min(...units);
}

/** The candidate with the smallest pole error, those that hold before the others. */
function best(candidates: readonly (Candidate | null)[]): Candidate | null {
  const found = candidates.filter((one) => one !== null);
  const rank = ({ check }: Candidate) => (check.holds ? 0 : 1);
  return found.toSorted((p, q) => rank(p) - rank(q) || p.check.poleError - q.check.poleError)[0] ?? null;
}

function robustCandidate(A: Matrix, B: Matrix, blocks: readonly WantedPole[], balanced: boolean): Candidate | null {
  const plant = scaled(A, B, blocks, balanced);
  const range = inputRange(plant);
  const scaledBlocks = inTime(blocks, plant);
  const spaces = scaledBlocks.map((block) => admissibleVectors(plant, range, block));
  const frame = spaces.every(({ size }) => size > 0) ? robustEigenvectors(spaces, plant.n) : null;
  if (!frame) return null;
  const K = unlessSingular(() => gainFromVectors(plant, range, frame, scaledBlocks));
  const method = balanced ? "eigenvectors of least condition, balanced units" : "eigenvectors of least condition";
  return K && candidate({ A, B, K, blocks, vectors: { frame, plant }, wide: false }, method, hasSpare(spaces, range));
}

/** Repeated poles strung into the shortest chains of principal vectors that this plant has. */
function chainCandidate(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate | null {
  if (!hasRepeats(blocks)) return null;
  const plant = scaled(A, B, blocks, true);
  const range = inputRange(plant);
  const scaledBlocks = inTime(blocks, plant);
  const spaces = scaledBlocks.map((block) => admissibleVectors(plant, range, block));
  if (range.rank === 0 || hasSpare(spaces, range)) return null;
  for (const chains of chainPlans(blocks, range.rank).slice(0, MOST_PLANS)) {
    const K = unlessSingular(() => {
      const frame = chainVectors(plant, range, spaces, chains);
      return frame && gainFromVectors(plant, range, frame, withPredecessors(scaledBlocks, chains));
    });
    const found = K && candidate({ A, B, K, blocks, vectors: null, wide: false }, CHAINS, false);
    if (found?.check.holds) return found;
  }
  return null;
}

function dyadicCandidate(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate | null {
  const K = dyadicGain(A, B, blocks);
  return K && candidate({ A, B, K, blocks, vectors: null, wide: true }, ONE_DIRECTION, false);
}

function withPredecessors(blocks: readonly WantedPole[], chains: readonly (readonly number[])[]): WantedPole[] {
  const linked = [...blocks];
  for (const chain of chains) {
    chain.forEach((place, k) => {
      if (k > 0) linked[place] = { ...blocks[place], after: blocks[chain[k - 1]].column };
    });
  }
  return linked;
}

function hasSpare(spaces: readonly Admissible[], { rank }: InputRange): boolean {
  return spaces.some(({ size }) => size > rank);
}

/** Null where vectors turn out to be dependent to working accuracy. */
function unlessSingular<T>(run: () => T): T | null {
  try {
    return run();
  } catch (error) {
    if (error instanceof NumericalError && error.code === "singular") return null;
    throw error;
  }
}

function candidate(placed: Placed, method: string, spare: boolean): Candidate {
  return { K: placed.K, method, check: verifyPlacement(placed), spare };
}

/** The only gain there is with one input; its eigenvectors, which leave no choice either, may be dependent to working accuracy. */
function singleInputCandidate(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate | null {
  const row = scaledSingleInputGain(A, B, blocks);
  if (!row) return null;
  const K = fromFlat(row, 1, A.rows);
  const plant = scaled(A, B, blocks, true);
  const range = inputRange(plant);
  const spaces = inTime(blocks, plant).map((block) => admissibleVectors(plant, range, block));
  const frame = hasRepeats(blocks) || spaces.some(({ size }) => size === 0) ? null : robustEigenvectors(spaces, plant.n);
  return candidate({ A, B, K, blocks, vectors: frame && { frame, plant }, wide: true }, SINGLE_INPUT, hasSpare(spaces, range));
}

function scaled(A: Matrix, B: Matrix, blocks: readonly WantedPole[], balanced: boolean): ScaledPlant {
  const fastest = Math.max(...blocks.map(({ re, im }) => Math.max(Math.abs(re), im)));
  return scalePlant(toFlat(A), toFlat(B), A.rows, B.columns, fastest, balanced);
}

function inTime(blocks: readonly WantedPole[], { time }: ScaledPlant): WantedPole[] {
  return blocks.map((block) => ({ ...block, re: block.re * time, im: block.im * time }));
}

function hasRepeats(blocks: readonly WantedPole[]): boolean {
  return blocks.some((block, k) => blocks.some((other, j) => j < k && samePole(other, block)));
}
