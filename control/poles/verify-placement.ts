import { Matrix } from "ml-matrix";
import { balance } from "../linalg/balance";
import { modulus } from "../linalg/complex";
import { flatIdentity, flatProduct, flatTranspose, pythagoras, toFlat } from "../linalg/flat";
import { factorLu, solveLu } from "../linalg/lu";
import { flatNorm, frobeniusNorm } from "../linalg/norms";
import { powerOfTwo } from "../linalg/power-of-two";
import { singularValues } from "../linalg/singular-values";
import { workArray } from "../linalg/work-array";
import type { Complex } from "../plant/model";
import { modeDistance } from "../structure/mode-distance";
import { achievedPoles } from "./achieved-poles";
import { columnsAsMatrix, type Frame } from "./eigenvector-frame";
import { residualColumns } from "./gain-from-vectors";
import type { ScaledPlant } from "./scale-plant";
import { polesOf, samePole, type WantedPole } from "./wanted-poles";

export type PlacementCheck = {
  /** Eigenvalues of A - B K, in the order of the blocks. */
  readonly achieved: readonly Complex[];
  /**
   * Largest error of a pole over its size, and what rounding of the gain, and of eigenvalues not found exactly, can account for;
   * never less than an error found exactly.
   */
  readonly poleError: number;
  readonly poleBound: number;
  /** Place of the pole with that error. */
  readonly worst: number;
  /** The poles were found with 32 digits. */
  readonly exact: boolean;
  /** No pole off by more than is usable; poles told by plain eigenvalues within their bounds, and the equation within its. */
  readonly holds: boolean;
  readonly conditioning: number | null;
  readonly residual: number;
  readonly bound: number;
  readonly poleShiftPerGainDigit: number | null;
};

export type Placed = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly K: Matrix;
  readonly blocks: readonly WantedPole[];
  /** Eigenvectors that the loop should have; null where no full set exists. */
  readonly vectors: { readonly frame: Frame; readonly plant: ScaledPlant } | null;
  /** The gain was found with more digits than K keeps, not solved for with those vectors. */
  readonly wide: boolean;
};

type Loop = { readonly B: Matrix; readonly K: Matrix; readonly closed: Matrix; readonly n: number };
type Vectors = { readonly frame: Frame; readonly plant: ScaledPlant; readonly X: Matrix; readonly inverse: Float64Array };

/** Roundings counted per entry of a bound. */
const SLACK = 16;

/** Beyond this share of its size a pole is not where it was wanted: a model is seldom better known. */
export const USABLE_POLE_ERROR = 1 / 16;

/**
 * Checks a gain against the poles it was made for: eigenvalues of A - B K, residual, conditioning, sensitivity.
 *
 * Shapes    A n×n, B n×m, K m×n, frame n×n
 * Units     those of the plant as given
 * Throws    no-convergence; not-finite
 * Accuracy  bounds are first order in ε with the factor 16 n; without eigenvectors they grow like the root a defective pole takes
 * Source    Wilkinson, The Algebraic Eigenvalue Problem, 1965, chapter 2
 */
export function verifyPlacement({ A, B, K, blocks, vectors, wide }: Placed): PlacementCheck {
  const loop = { B, K, closed: Matrix.sub(A, B.mmul(K)), n: A.rows };
  const wanted = polesOf(blocks);
  const { poles: achieved, errors, exact } = achievedPoles(A, B, K, wanted);
  // A pole wanted at zero has no size of its own: it is judged beside the others, or beside the plant.
  const floor = Math.max(...wanted.map(modulus)) || frobeniusNorm(A) || frobeniusNorm(loop.closed) || 1;
  const sizes = wanted.map((pole) => modulus(pole) || floor);
  const set = vectors && inGivenUnits(vectors.frame, vectors.plant, blocks);
  const { bounds, shifts } = set ? simpleBounds(loop, blocks, set, wide, exact) : defectiveBounds(loop, blocks);
  const { residual, bound } = set ? vectorResidual(set, K, blocks) : distanceResidual(loop, blocks);
  const values = set ? singularValues(set.X) : [1, 0];
  const condition = values[0] / values[loop.n - 1];
  const shares = errors.map((error, k) => error / sizes[k]);
  const poleError = Math.max(...shares);
  return {
    achieved,
    poleError,
    worst: shares.indexOf(poleError),
    exact,
    poleBound: Math.max(exact ? poleError : 0, ...bounds.map((limit, k) => limit / sizes[k])),
    holds: poleError <= USABLE_POLE_ERROR && (exact || (residual <= bound && errors.every((error, k) => error <= bounds[k]))),
    conditioning: condition * loop.n * Number.EPSILON < 1 ? condition : null,
    residual,
    bound,
    poleShiftPerGainDigit: shifts && Math.max(...shifts.map((shift, k) => shift / sizes[k])),
  };
}

/** The eigenvectors in the plant's units, each again of unit length, with their inverse; null when they are dependent. */
function inGivenUnits(frame: Frame, plant: ScaledPlant, blocks: readonly WantedPole[]): Vectors | null {
  const X = columnsAsMatrix(frame);
  for (let i = 0; i < X.rows; i++) X.mulRow(i, plant.state[i]);
  for (const { column, width } of blocks) {
    const both = width === 1 ? X.getColumn(column) : [...X.getColumn(column), ...X.getColumn(column + 1)];
    const length = flatNorm(both) / Math.sqrt(width);
    for (let k = 0; k < width; k++) X.mulColumn(column + k, 1 / length);
  }
  const factors = factorLu(toFlat(X), X.rows);
  if (factors.zeroPivot >= 0) return null;
  const inverse = solveLu(factors, flatIdentity(X.rows), X.rows);
  return inverse.every(Number.isFinite) ? { frame, plant, X, inverse } : null;
}

/**
 * Per pole: its condition times rounding of the loop, in the units its eigenvalues are computed in unless those are exact and
 * in those the gain was solved for in, and |y|'|B||K||x|.
 */
function simpleBounds(
  { B, K, closed, n }: Loop,
  blocks: readonly WantedPole[],
  { X, inverse, plant }: Vectors,
  wide: boolean,
  exact: boolean,
) {
  const { matrix, order, scale: ordered, shift } = balance(toFlat(closed), n);
  const norm = flatNorm(matrix) * powerOfTwo(-shift);
  const scale = workArray(n);
  order.forEach((i, place) => {
    scale[i] = ordered[place];
  });
  const columns = flatTranspose(toFlat(X), n, n);
  const absB = toFlat(B).map(Math.abs);
  const absK = toFlat(K).map(Math.abs);
  const bounds: number[] = [];
  const shifts: number[] = [];
  for (const { column, width } of blocks) {
    const right = modulusOf(columns, column, width, n);
    const left = modulusOf(inverse, column, width, n);
    const ofEigenvalue = exact ? 0 : norm * productOfNorms(right, left, (i) => scale[i]);
    const ofGain = wide ? 0 : sizeIn(plant, K) * productOfNorms(right, left, (i) => plant.state[i]);
    const effort = flatProduct(absK, right, B.columns, n, 1);
    const moved = flatProduct(flatProduct(left, absB, 1, n, B.columns), effort, 1, B.columns, 1)[0];
    for (let k = 0; k < width; k++) {
      bounds.push(SLACK * n * Number.EPSILON * (ofEigenvalue + ofGain + moved));
      shifts.push(moved);
    }
  }
  return { bounds, shifts };
}

/** |D⁻¹x| |D y| */
function productOfNorms(right: Float64Array, left: Float64Array, unit: (i: number) => number): number {
  return flatNorm(right.map((entry, i) => entry / unit(i))) * flatNorm(left.map((entry, i) => entry * unit(i)));
}

/** |A| + |B| |K| in scaled states and inputs. */
function sizeIn(plant: ScaledPlant, K: Matrix): number {
  return (flatNorm(plant.a) + flatNorm(plant.b) * flatNorm(scaledGain(plant, K))) / plant.time;
}

/** K for scaled states, inputs and time. */
function scaledGain({ n, state, input, time }: ScaledPlant, K: Matrix): Float64Array {
  return toFlat(K).map((entry, at) => ((entry * state[at % n]) / input[Math.floor(at / n)]) * time);
}

/** |x| of one real vector, or of (u + i v) / √2 for the two rows of a pair. */
function modulusOf(rows: Float64Array, row: number, width: number, n: number): Float64Array {
  const at = row * n;
  return Float64Array.from({ length: n }, (_, i) => {
    return width === 1 ? Math.abs(rows[at + i]) : pythagoras(rows[at + i], rows[at + n + i]) * Math.SQRT1_2;
  });
}

/** A pole of multiplicity k moves like the k-th root of a rounding; the other poles, whose condition is not known, are given as much. */
function defectiveBounds({ closed, n }: Loop, blocks: readonly WantedPole[]) {
  const { matrix, shift } = balance(toFlat(closed), n);
  const norm = flatNorm(matrix) * powerOfTwo(-shift);
  const most = Math.max(...blocks.map((block) => blocks.filter((other) => samePole(other, block)).length));
  const bound = SLACK * norm * rootOf(n * Number.EPSILON, most === 1 ? n : most);
  return { bounds: new Array<number>(n).fill(bound), shifts: null };
}

/** The k-th root of 0 < x < 1, from above, by bisection. */
function rootOf(x: number, k: number): number {
  let low = 0;
  let high = 1;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    let power = 1;
    for (let i = 0; i < k; i++) power *= middle;
    if (power < x) low = middle;
    else high = middle;
  }
  return high;
}

/** Of (A - B K) X = X Λ in the units the vectors were found in. */
function vectorResidual({ frame, plant }: Vectors, K: Matrix, blocks: readonly WantedPole[]) {
  const { n, m, a, b, time } = plant;
  const gain = scaledGain(plant, K);
  const effect = flatProduct(b, gain, n, m, n);
  const scaled = blocks.map((block) => ({ ...block, re: block.re * time, im: block.im * time }));
  const x = flatTranspose(frame.columns, n, n);
  const left = residualColumns(
    a.map((entry, at) => entry - effect[at]),
    x,
    scaled,
    n,
  );
  const size = (flatNorm(a) + flatNorm(b) * flatNorm(gain)) * flatNorm(x);
  return { residual: size === 0 ? 0 : flatNorm(left) / size, bound: SLACK * n * Number.EPSILON };
}

/** Largest distance, relative, from A - B K to a matrix that has one of the poles exactly. */
function distanceResidual({ closed, n }: Loop, blocks: readonly WantedPole[]) {
  const none = workArray(0);
  const distances = blocks.map(({ re, im }) => modeDistance(toFlat(closed), none, n, 0, { re, im }).relative);
  return { residual: Math.max(...distances), bound: SLACK * n * Number.EPSILON };
}
