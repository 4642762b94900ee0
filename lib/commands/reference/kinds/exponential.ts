import { Matrix } from "ml-matrix";
import { holdEquivalent } from "@/control/response/hold-equivalent";
import { matrixExponential } from "@/control/response/matrix-exponential";
import { exactExponential, fixedDifference } from "../exact-exponential";
import { distance, FACTOR, fromRows, type Kind, type Rows, random } from "../kind";

/** `condition` is that of the exponential in the Frobenius norm; only the other library tells it. */
type Answer = { readonly value: Matrix; readonly condition: number | null };

const worst = (values: readonly number[]) => values.reduce((most, x) => Math.max(most, Math.abs(x)), 0);

/** In units of the condition that one of the answers brings. */
function difference(one: Answer, other: Answer): number {
  return distance(one.value, other.value) / Math.max(1, one.condition ?? other.condition ?? 1);
}

export const exponential: Kind<{ readonly A: Matrix }, Answer> = {
  name: "matrix exponential",
  measure: "true error",
  problems: (uniform) => [1, 2, 4, 8, 12].flatMap((n) => [0.1, 1, 6].map((size) => ({ A: random(uniform, n, n).mul(size) }))),
  question: ({ A }) => ({ ask: "exponential", A }),
  ours: ({ A }) => ({ value: matrixExponential(A), condition: null }),
  theirs: ({ value, condition }: { value: Rows; condition: number }) => ({ value: fromRows(value), condition }),
  difference: (_, one, other) => difference(one, other),
  allowed: ({ A }) => FACTOR * A.rows * Number.EPSILON,
  error: ({ A }, { value }) => worst(fixedDifference(exactExponential(A), value)) / worst(value.to1DArray()),
};

type Held = { readonly A: Matrix; readonly B: Matrix; readonly period: number };

const beside = (left: Matrix, right: Matrix) => new Matrix(left.to2DArray().map((row, i) => [...row, ...right.getRow(i)]));

/** [A B; 0 0] · period: the first rows of its exponential hold the sampled plant. */
export function heldBlock({ A, B, period }: Held): Matrix {
  const block = Matrix.zeros(A.rows + B.columns, A.rows + B.columns);
  block.setSubMatrix(beside(A, B), 0, 0);
  return block.mul(period);
}

export const hold: Kind<Held, Answer> = {
  name: "zero-order hold",
  measure: "true error",
  problems: (uniform) =>
    [
      [2, 1],
      [4, 2],
      [8, 3],
      [12, 4],
    ].flatMap(([n, m]) => [0.125, 1].map((period) => ({ A: random(uniform, n, n), B: random(uniform, n, m), period }))),
  question: ({ A, B, period }) => ({ ask: "hold", A, B, period }),
  ours: (problem) => {
    const { A, B } = holdEquivalent(problem);
    return { value: beside(A, B), condition: null };
  },
  theirs: ({ A, B, condition }: { A: Rows; B: Rows; condition: number }) => ({
    value: beside(fromRows(A), fromRows(B)),
    condition,
  }),
  difference: (_, one, other) => difference(one, other),
  allowed: ({ A, B }) => FACTOR * (A.rows + B.columns) * Number.EPSILON,
  error: (problem, { value }) => {
    const truth = exactExponential(heldBlock(problem)).slice(0, problem.A.rows);
    return worst(fixedDifference(truth, value)) / worst(value.to1DArray());
  },
};
