import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { solveLinear } from "../linalg/solve-linear";
import { symmetricEigenvalues } from "../linalg/symmetric-eigenvalues";
import type { PlantModel, Rows } from "../plant/model";

/** A state that is the integral of another one: `factor` times the rate is the position's own rate of change. */
export type RatePair = { readonly position: number; readonly rate: number; readonly factor: number };

export type VirtualSprings = {
  readonly pairs: readonly RatePair[];
  /** m×r: what each input answers to one unit of each position, and to one unit a second of its rate of change; u = -K x. */
  readonly stiffness: Rows;
  readonly damping: Rows;
  /** The columns of K that belong to no pair. */
  readonly others: readonly number[];
  /**
   * What the feedback does with energy, where the inputs push along the positions one for one; null where they do not, so that
   * force times motion is not known.
   */
  readonly energy: {
    /** In every motion, in some, or in none the dampers take energy out; `some` also where they feed it in elsewhere. */
    readonly dissipates: "always" | "some" | "never";
    /** The springs pull back in every direction, in some, or in none. */
    readonly restores: "always" | "some" | "never";
    /** Share of the stiffness that is unsymmetric, 0 to 1: such a part can feed energy in or take it out round a cycle. */
    readonly unsymmetric: number;
  } | null;
};

/** What counts as symmetric of a matrix that comes out of a linear solve. */
const SYMMETRIC = 1e-9;

/** Positions of the plant whose rates are states of it too: their row of A holds one entry alone, and no input reaches them. */
export function ratePairs({ A, B, timeBase }: Pick<PlantModel, "A" | "B" | "timeBase">): RatePair[] {
  if (timeBase.kind === "sampled") return [];
  return A.flatMap((row, position): RatePair[] => {
    const rate = row.findIndex((entry) => entry !== 0);
    const alone = rate >= 0 && rate !== position && row.every((entry, j) => entry === 0 || j === rate);
    return alone && B[position].every((entry) => entry === 0) ? [{ position, rate, factor: row[rate] }] : [];
  });
}

/**
 * A state feedback read as springs and dampers between positions and inputs.
 *
 * Shapes    K m×n → stiffness and damping m×r for r pairs of position and rate
 * Units     stiffness in input per position, damping in input per position and second
 * Throws    nothing; null for a sampled plant, or one without such pairs
 * Accuracy  entries of K, damping divided once by the pair's factor
 * Source    common practice, no source: proportional and derivative action seen as a spring and a damper; power of a linear damper
 *           from the symmetric part of its matrix
 */
export function virtualSprings(model: PlantModel, K: Rows): VirtualSprings | null {
  const pairs = ratePairs(model);
  if (pairs.length === 0) return null;
  const stiffness = K.map((row) => pairs.map(({ position }) => row[position]));
  const damping = K.map((row) => pairs.map(({ rate, factor }) => row[rate] / factor));
  const used = new Set(pairs.flatMap(({ position, rate }) => [position, rate]));
  const others = model.states.flatMap((_, index) => (used.has(index) ? [] : [index]));
  return { pairs, stiffness, damping, others, energy: energyOf(model, pairs, stiffness, damping) };
}

function energyOf({ B }: PlantModel, pairs: readonly RatePair[], stiffness: Rows, damping: Rows): VirtualSprings["energy"] {
  const r = pairs.length;
  if (stiffness.length !== r) return null;
  const pushes = new Matrix(pairs.map(({ rate, factor }) => B[rate].map((entry) => entry * factor)));
  if (!actsAsMass(pushes)) return null;
  const [spring, damper] = [stiffness, damping].map((rows) => new Matrix(rows.map((row) => [...row])));
  return {
    dissipates: signOf(damper),
    restores: signOf(spring),
    unsymmetric: shareOf(Matrix.sub(spring, spring.transpose()).mul(0.5), spring),
  };
}

/** Whether what the inputs do to the accelerations is the inverse of a mass: symmetric and positive, so that they push one for one. */
function actsAsMass(pushes: Matrix): boolean {
  try {
    const mass = solveLinear(pushes, Matrix.eye(pushes.rows)).X;
    if (shareOf(Matrix.sub(mass, mass.transpose()), mass) > SYMMETRIC) return false;
    return symmetricEigenvalues(symmetricPart(mass))[0] > 0;
  } catch (error) {
    if (error instanceof NumericalError) return false;
    throw error;
  }
}

const symmetricPart = (M: Matrix) => Matrix.add(M, M.transpose()).mul(0.5);
const shareOf = (part: Matrix, whole: Matrix) => part.norm("frobenius") / (whole.norm("frobenius") || 1);

function signOf(M: Matrix): "always" | "some" | "never" {
  const values = symmetricEigenvalues(symmetricPart(M));
  const rounding = values.length * Number.EPSILON * Math.max(...values.map(Math.abs));
  if (values[0] > rounding) return "always";
  return values[values.length - 1] > rounding ? "some" : "never";
}
