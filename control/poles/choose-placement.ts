import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { fromFlat, toFlat } from "../linalg/flat";
import { admissibleVectors, type InputRange, inputRange } from "./admissible-vectors";
import { dyadicGain, scaledSingleInputGain } from "./dyadic-gain";
import type { Frame } from "./eigenvector-frame";
import { gainFromVectors } from "./gain-from-vectors";
import { robustEigenvectors } from "./robust-eigenvectors";
import { type ScaledPlant, scalePlant } from "./scale-plant";
import { evenStateUnits } from "./state-units";
import { type Placed, type PlacementCheck, USABLE_POLE_ERROR, verifyPlacement } from "./verify-placement";
import type { WantedPole } from "./wanted-poles";

export type Candidate = { readonly K: Matrix; readonly method: string; readonly check: PlacementCheck };

const SINGLE_INPUT = "one input: row of the wanted polynomial in double-double";
const ONE_DIRECTION = "one direction of the inputs: row of the wanted polynomial in double-double";

/** Beyond this condition or error in the plant's own units, the same is tried in balanced ones. */
const DOUBTFUL = Math.sqrt(Number.EPSILON);
const LIKE_UNITS = 4;

/**
 * A checked gain for a plant whose inputs move every mode.
 *
 * Shapes    A n×n, B n×m, blocks covering n poles; `defective` when a pole is repeated more often than rank B
 * Units     entries and poles of like size, or they may not be squared
 * Throws    too-sensitive { poleError?, limit }; no-convergence
 * Accuracy  the check's
 */
export function freePlacement(A: Matrix, B: Matrix, blocks: readonly WantedPole[], defective: boolean): Candidate {
  if (B.columns === 1) {
    const row = scaledSingleInputGain(A, B, blocks);
    const vectors = defective ? null : onlyVectors(A, B, blocks);
    if (row) return accept([candidate({ A, B, K: fromFlat(row, 1, A.rows), blocks, vectors, wide: true }, SINGLE_INPUT)]);
  }
  if (defective) {
    const K = dyadicGain(A, B, blocks);
    return accept(K ? [candidate({ A, B, K, blocks, vectors: null, wide: true }, ONE_DIRECTION)] : []);
  }
  return robustPlacement(A, B, blocks);
}

/** The same with eigenvectors chosen for their independence, which also keeps modes that no input moves. */
export function robustPlacement(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate {
  const asGiven = robustCandidate(A, B, blocks, false);
  const { check } = asGiven ?? {};
  if (
    asGiven &&
    check?.holds &&
    check.poleError <= DOUBTFUL &&
    (check.conditioning ?? Number.POSITIVE_INFINITY) <= 1 / DOUBTFUL
  ) {
    return asGiven;
  }
  const balanced = unitsDiffer(A, B) ? robustCandidate(A, B, blocks, true) : null;
  return accept([asGiven, balanced].filter((found) => found !== null));
}

/** Whether balancing would change anything worth the time of a second search. */
function unitsDiffer(A: Matrix, B: Matrix): boolean {
  const units = evenStateUnits(toFlat(A), toFlat(B), A.rows, B.columns);
  return Math.max(...units) > LIKE_UNITS * Math.min(...units);
}

/** The candidate with the smallest pole error, if it holds. */
function accept(candidates: readonly Candidate[]): Candidate {
  const sorted = candidates.toSorted((p, q) => p.check.poleError - q.check.poleError);
  const best = sorted.find(({ check }) => check.holds);
  if (best) return best;
  throw new NumericalError("too-sensitive", { poleError: sorted[0]?.check.poleError, limit: USABLE_POLE_ERROR });
}

function robustCandidate(A: Matrix, B: Matrix, blocks: readonly WantedPole[], balanced: boolean): Candidate | null {
  const plant = scaled(A, B, blocks, balanced);
  const range = inputRange(plant);
  const scaledBlocks = inTime(blocks, plant);
  const spaces = scaledBlocks.map((block) => admissibleVectors(plant, range, block));
  const frame = spaces.every(({ size }) => size > 0) ? robustEigenvectors(spaces, plant.n) : null;
  if (!frame) return null;
  const K = gainOrNull(plant, range, frame, scaledBlocks);
  const method = balanced ? "eigenvectors of least condition, balanced units" : "eigenvectors of least condition";
  return K && candidate({ A, B, K, blocks, vectors: { frame, plant }, wide: false }, method);
}

function gainOrNull(plant: ScaledPlant, range: InputRange, frame: Frame, blocks: readonly WantedPole[]): Matrix | null {
  try {
    return gainFromVectors(plant, range, frame, blocks);
  } catch (error) {
    if (error instanceof NumericalError && error.code === "singular") return null;
    throw error;
  }
}

function candidate(placed: Placed, method: string): Candidate {
  return { K: placed.K, method, check: verifyPlacement(placed) };
}

/** Eigenvectors of a loop with one input, which leaves no choice; null when they are dependent to working accuracy. */
function onlyVectors(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Placed["vectors"] {
  const plant = scaled(A, B, blocks, true);
  const range = inputRange(plant);
  const frame = robustEigenvectors(
    inTime(blocks, plant).map((block) => admissibleVectors(plant, range, block)),
    plant.n,
  );
  return frame && { frame, plant };
}

function scaled(A: Matrix, B: Matrix, blocks: readonly WantedPole[], balanced: boolean): ScaledPlant {
  const fastest = Math.max(...blocks.map(({ re, im }) => Math.max(Math.abs(re), im)));
  return scalePlant(toFlat(A), toFlat(B), A.rows, B.columns, fastest, balanced);
}

function inTime(blocks: readonly WantedPole[], { time }: ScaledPlant): WantedPole[] {
  return blocks.map((block) => ({ ...block, re: block.re * time, im: block.im * time }));
}
