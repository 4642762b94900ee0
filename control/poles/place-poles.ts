import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { fromFlat, toFlat } from "../linalg/flat";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { singularValues } from "../linalg/singular-values";
import type { Complex } from "../plant/model";
import { admissibleVectors, type InputRange, inputRange } from "./admissible-vectors";
import { dyadicGain, scaledSingleInputGain } from "./dyadic-gain";
import type { Frame } from "./eigenvector-frame";
import { keepFixedModes } from "./fixed-modes";
import { gainFromVectors } from "./gain-from-vectors";
import { matchPoles } from "./match-poles";
import { robustEigenvectors } from "./robust-eigenvectors";
import { type ScaledPlant, scalePlant } from "./scale-plant";
import { type Placed, type PlacementCheck, verifyPlacement } from "./verify-placement";
import { groupPoles, multiplicityOf, type WantedPole } from "./wanted-poles";

export type PlacementProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly poles: readonly Complex[];
  /** Repeat a pole more often than rank B allows for independent eigenvectors; such loops are very sensitive. */
  readonly allowDefective?: boolean;
};

export type Placement = {
  readonly K: Matrix;
  /** Eigenvalues of A - B K in the order of the wanted poles. */
  readonly achieved: readonly Complex[];
  /** Largest error of a pole relative to its size, and what rounding can account for. */
  readonly poleError: number;
  readonly poleBound: number;
  /** 2-norm condition of the unit eigenvectors of A - B K in the plant's units; null when it has no full set. */
  readonly conditioning: number | null;
  /** Of (A - B K) X = X Λ, relative. */
  readonly residual: number;
  readonly bound: number;
  readonly method: string;
  /** Largest singular value of K. */
  readonly gainNorm: number;
  /** Times 10⁻ᵈ: largest relative first-order shift of a pole when every entry of K is kept to d digits; null when defective. */
  readonly poleShiftPerGainDigit: number | null;
  /** Modes that no input moves and that were among the wanted poles. */
  readonly fixedModes: readonly Complex[];
};

type Candidate = { readonly K: Matrix; readonly method: string; readonly check: PlacementCheck };

const SINGLE_INPUT = "one input: row of the wanted polynomial in double-double";
const ONE_DIRECTION = "one direction of the inputs: row of the wanted polynomial in double-double";

/** Beyond this condition or error in the plant's own units, the same is tried in balanced ones. */
const DOUBTFUL = Math.sqrt(Number.EPSILON);

/**
 * The gain K that gives A - B K the wanted poles. With several inputs, of all such gains one whose eigenvectors are as
 * independent as a search from fixed starts can make them.
 *
 * Shapes    A n×n, B n×m, n poles → K m×n
 * Units     poles in the plant's plane; K in input per state
 * Throws    shape-mismatch; not-finite; pole-count; poles-not-conjugate; pole-multiplicity { pole, multiplicity, rank };
 *           not-controllable { pole, state, distance } when a mode that no input moves is not among the wanted poles;
 *           inaccurate { residual, bound } when the poles of A - B K miss by more than rounding accounts for; no-convergence
 * Accuracy  poleError ≤ poleBound, residual ≤ bound = 16 n ε, both checked before return
 * Source    Kautsky, Nichols & Van Dooren, Int. J. Control 41 (1985) 1129-1155; Tits & Yang, IEEE Trans. Autom. Control 41
 *           (1996) 1432-1452; one input: Ackermann 1972 in double-double
 */
export function placePoles({ A, B, poles, allowDefective = false }: PlacementProblem): Placement {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  const { blocks, fixed } = keepFixedModes(A, B, groupPoles(poles, A.rows));
  const { K, method, check } = fixed.length === 0 ? freePlacement(A, B, blocks, allowDefective) : robustPlacement(A, B, blocks);
  return {
    K,
    achieved: matchPoles(poles, check.achieved),
    poleError: check.poleError,
    poleBound: check.poleBound,
    conditioning: check.conditioning,
    residual: check.residual,
    bound: check.bound,
    method: fixed.length === 0 ? method : `${method}; modes that no input moves kept`,
    gainNorm: singularValues(K)[0] ?? 0,
    poleShiftPerGainDigit: check.poleShiftPerGainDigit,
    fixedModes: fixed,
  };
}

function freePlacement(A: Matrix, B: Matrix, blocks: readonly WantedPole[], allowDefective: boolean): Candidate {
  const plant = scaled(A, B, blocks, false);
  const { rank } = inputRange(plant);
  const excess = blocks.find((block) => multiplicityOf(block, blocks) > rank);
  if (excess && !allowDefective) {
    const { re, im } = excess;
    throw new NumericalError("pole-multiplicity", { pole: { re, im }, multiplicity: multiplicityOf(excess, blocks), rank });
  }
  if (B.columns === 1) {
    const row = scaledSingleInputGain(A, B, blocks);
    const vectors = excess ? null : onlyVectors(A, B, blocks);
    if (row) return accept([candidate({ A, B, K: fromFlat(row, 1, A.rows), blocks, vectors, wide: true }, SINGLE_INPUT)]);
  }
  if (excess) {
    const K = dyadicGain(A, B, blocks);
    return accept(K ? [candidate({ A, B, K, blocks, vectors: null, wide: true }, ONE_DIRECTION)] : []);
  }
  return robustPlacement(A, B, blocks);
}

function robustPlacement(A: Matrix, B: Matrix, blocks: readonly WantedPole[]): Candidate {
  const asGiven = robustCandidate(A, B, blocks, false);
  const { check } = asGiven ?? {};
  if (asGiven && check?.holds && check.poleError <= DOUBTFUL && (check.conditioning ?? Infinity) <= 1 / DOUBTFUL) return asGiven;
  return accept([asGiven, robustCandidate(A, B, blocks, true)].filter((found) => found !== null));
}

/** The candidate with the smallest pole error among those that hold. */
function accept(candidates: readonly Candidate[]): Candidate {
  const sorted = candidates.toSorted((p, q) => p.check.poleError - q.check.poleError);
  const best = sorted.find(({ check }) => check.holds && check.poleBound < 1);
  if (best) return best;
  const { poleError, poleBound } = sorted[0]?.check ?? { poleError: 1, poleBound: 0 };
  throw new NumericalError("inaccurate", { residual: poleError, bound: Math.min(poleBound, 1) });
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
