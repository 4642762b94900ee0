import { Matrix } from "ml-matrix";
import { frequencyResponse } from "@/control/margins/frequency-response";
import { exactResponse } from "../exact-response";
import { FACTOR, type Kind, random } from "../kind";

type Problem = { readonly A: Matrix; readonly B: Matrix; readonly C: Matrix; readonly frequencies: readonly number[] };
/** One row per frequency: entry after entry, real part and imaginary part. `scales`: what one ε of the data moves an entry by. */
type Answer = { readonly rows: readonly (readonly number[])[]; readonly scales: readonly number[] | null };

const FREQUENCIES = [0, 0.1, 0.7, 1, 3, 30];

function ours({ A, B, C, frequencies }: Problem): Answer {
  const { re, im } = frequencyResponse({ A, B, C, D: Matrix.zeros(C.rows, B.columns) }, null, frequencies);
  const count = C.rows * B.columns;
  const entries = Array.from({ length: count }, (_, at) => at);
  return { rows: frequencies.map((_, k) => entries.flatMap((at) => [re[k * count + at], im[k * count + at]])), scales: null };
}

const apart = (one: readonly number[], other: readonly number[]) => Math.max(...one.map((x, k) => Math.abs(x - other[k])));

export const response: Kind<Problem, Answer> = {
  name: "frequency response",
  measure: "true error",
  problems: (uniform) =>
    [
      [1, 1, 1],
      [4, 2, 2],
      [8, 3, 2],
      [12, 4, 4],
    ].map(([n, m, p]) => ({
      A: Matrix.sub(random(uniform, n, n), Matrix.eye(n)),
      B: random(uniform, n, m),
      C: random(uniform, p, n),
      frequencies: FREQUENCIES,
    })),
  question: ({ A, B, C, frequencies }) => ({ ask: "frequency_response", A, B, C, frequencies }),
  ours,
  theirs: ({ values, scales }: { values: [number, number][][][]; scales: number[] }) => ({
    rows: values.map((value) => value.flat(2)),
    scales,
  }),
  // At each frequency in units of its own condition.
  difference: (_, one, other) => {
    const scales = one.scales ?? other.scales ?? [];
    return Math.max(...one.rows.map((row, k) => apart(row, other.rows[k]) / scales[k]));
  },
  allowed: ({ A }) => FACTOR * A.rows * Number.EPSILON,
  error: ({ A, B, C, frequencies }, { rows }) =>
    Math.max(
      ...frequencies.map((frequency, k) => {
        const truth = exactResponse(A, B, C, frequency);
        return apart(rows[k], truth) / Math.max(...truth.map(Math.abs));
      }),
    ),
};
