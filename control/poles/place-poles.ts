import type { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { largestEntry } from "../linalg/flat";
import { exponentOf, powerOfTwo } from "../linalg/power-of-two";
import { requireFinite, requireShape, requireSquare } from "../linalg/require";
import { requireRepresentable } from "../linalg/require-representable";
import { singularValues } from "../linalg/singular-values";
import { workScope } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import { type Candidate, firstPlacement, freePlacement, robustPlacement } from "./choose-placement";
import { keepFixedModes } from "./fixed-modes";
import { matchPoles } from "./match-poles";
import { requireFewRepeats } from "./require-few-repeats";
import { isStablePole } from "./require-stable-poles";
import { USABLE_POLE_ERROR } from "./verify-placement";
import { groupPoles, polesOf, type WantedPole } from "./wanted-poles";

const KEPT = "modes that no input moves kept";
const CAUTION = "poles that rounding of the gain moves visibly";
/** Pole error from which a placement says so in its method. */
const SENSITIVE = 1e-6;

export type PlacementProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly poles: readonly Complex[];
  /**
   * Repeat poles more often than the inputs allow for independent eigenvectors: they share chains of principal vectors as short as
   * the inputs allow, and move like the root, of the longest chain's order, of a rounding.
   */
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

/**
 * The gain K that gives A - B K the wanted poles. With several inputs, of all such gains one whose eigenvectors are as
 * independent as a search from fixed starts can make them.
 *
 * Shapes    A n×n, B n×m, n poles → K m×n
 * Units     poles in the plant's plane; K in input per state
 * Throws    shape-mismatch; not-finite; pole-count; poles-not-conjugate; pole-multiplicity { pole, multiplicity, rank };
 *           not-controllable { pole, state, distance } when a mode that no input moves is not among the wanted poles;
 *           too-sensitive { poleError?, pole?, limit } when even that gain, rounded to doubles, misses by more than a sixteenth of a pole;
 *           not-stabilising { pole } when so rounded it leaves the boundary that all wanted poles respect; no-convergence; too-large
 * Accuracy  poleError is that of the gain returned, with poles found with 32 digits: 1e-12 κ or better. One input: every entry
 *           of the gain the double next to the exact one, or its neighbour
 * Source    Kautsky, Nichols & Van Dooren, Int. J. Control 41 (1985) 1129-1155; Tits & Yang, IEEE Trans. Autom. Control 41
 *           (1996) 1432-1452; one input: Ackermann 1972 in double-double; chains: Klein & Moore 1977 (from memory)
 */
export function placePoles(problem: PlacementProblem): Placement {
  return workScope(() => place(problem));
}

function place({ A, B, poles, allowDefective = false }: PlacementProblem): Placement {
  requireSquare("A", A);
  requireShape("B", B, A.rows, B.columns);
  requireFinite("A", A);
  requireFinite("B", B);
  const wanted = groupPoles(poles, A.rows);
  // Time and effort in exact powers of two of their units, so that nothing overflows on the way.
  const time = unitPower(Math.max(largestEntry(A.to1DArray()), ...wanted.map(({ re, im }) => Math.max(Math.abs(re), im))));
  const effort = unitPower(largestEntry(B.to1DArray()));
  const scaled = { A: A.clone().mul(time), B: B.clone().mul(effort) };
  const inUnit = (block: WantedPole) => ({ ...block, re: block.re * time, im: block.im * time });
  const { chosen, fixed } = choose({ A, B }, wanted, scaled, inUnit, allowDefective);
  const { K, method, check } = chosen;
  const gain = K.clone().mul(effort).div(time);
  requireKept(K, gain.clone().mul(time).div(effort));
  const achieved = check.achieved.map(({ re, im }) => ({ re: re / time, im: im / time }));
  requireSameSide(poles, achieved);
  const gainNorm = (singularValues(K)[0] * effort) / time;
  requireRepresentable("gain", [gainNorm, ...gain.to1DArray()]);
  requireRepresentable(
    "poles",
    achieved.flatMap(({ re, im }) => [re, im]),
  );
  return {
    K: gain,
    achieved: matchPoles(poles, achieved),
    poleError: check.poleError,
    poleBound: check.poleBound,
    conditioning: check.conditioning,
    residual: check.residual,
    bound: check.bound,
    method: [method, ...(fixed.length > 0 ? [KEPT] : []), ...(check.poleError > SENSITIVE ? [CAUTION] : [])].join("; "),
    gainNorm,
    poleShiftPerGainDigit: check.poleShiftPerGainDigit,
    fixedModes: fixed,
  };
}

type Pair = { readonly A: Matrix; readonly B: Matrix };

/** The placement, and the modes that no input moves, which are only looked for where a first try leaves a doubt. */
function choose(
  { A, B }: Pair,
  wanted: readonly WantedPole[],
  scaled: Pair,
  inUnit: (block: WantedPole) => WantedPole,
  allowDefective: boolean,
): { chosen: Candidate; fixed: readonly Complex[] } {
  const first = firstPlacement(scaled.A, scaled.B, wanted.map(inUnit));
  if (first.found && first.proven) return { chosen: first.found, fixed: [] };
  const { blocks, fixed } = keepFixedModes(A, B, wanted);
  const inTime = blocks.map(inUnit);
  if (fixed.length === 0) requireFewRepeats(scaled.A, scaled.B, blocks, allowDefective);
  const chosen =
    fixed.length > 0
      ? robustPlacement(scaled.A, scaled.B, inTime)
      : freePlacement(scaled.A, scaled.B, inTime, first.found, allowDefective);
  return { chosen: requireUsable(chosen, blocks), fixed };
}

/** Throws too-sensitive, with the pole that is farthest off, unless the gain holds its poles. */
function requireUsable(chosen: Candidate | null, blocks: readonly WantedPole[]): Candidate {
  if (chosen?.check.holds) return chosen;
  const pole = chosen ? polesOf(blocks)[chosen.check.worst] : undefined;
  throw new NumericalError("too-sensitive", {
    ...(chosen && pole ? { poleError: chosen.check.poleError, pole } : {}),
    limit: USABLE_POLE_ERROR,
  });
}

/** Throws not-stabilising when all poles were wanted on the stable side of a boundary and one is not there. */
function requireSameSide(wanted: readonly Complex[], achieved: readonly Complex[]): void {
  for (const sampled of [false, true]) {
    if (!wanted.every((pole) => isStablePole(pole, sampled))) continue;
    const pole = achieved.find((value) => !isStablePole(value, sampled));
    if (pole) throw new NumericalError("not-stabilising", { pole });
  }
}

function unitPower(size: number): number {
  return size === 0 ? 1 : powerOfTwo(-exponentOf(size));
}

/** The gain was judged in its own units: digits that underflow beside the given ones would move poles unseen. */
function requireKept(judged: Matrix, given: Matrix): void {
  for (let i = 0; i < judged.rows; i++)
    for (let j = 0; j < judged.columns; j++)
      if (given.get(i, j) !== judged.get(i, j) && Number.isFinite(given.get(i, j)))
        throw new NumericalError("too-sensitive", { limit: USABLE_POLE_ERROR });
}
