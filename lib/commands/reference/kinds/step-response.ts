import { Matrix } from "ml-matrix";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { respond } from "@/control/response/respond";
import { exactExponential, fixed, fixedDifference, fixedProduct } from "../exact-exponential";
import { distance, FACTOR, fromRows, type Kind, random } from "../kind";
import { heldBlock } from "./exponential";

type Problem = { readonly A: Matrix; readonly B: Matrix; readonly C: Matrix; readonly horizon: number };
/** One row per output, one column per moment. */
type Answer = Matrix;

/** `respond` records this many moments, the first at zero. */
const MOMENTS = 401;
/** Of these, every so many is compared. */
const STRIDE = 40;

const moments = Array.from({ length: Math.floor((MOMENTS - 1) / STRIDE) + 1 }, (_, k) => k * STRIDE);

function problem(uniform: () => number, n: number, p: number): Problem {
  const M = random(uniform, n, n);
  const shift = 0.3 + Math.max(...eigenvalues(M).map(({ re }) => re));
  return { A: Matrix.sub(M, Matrix.eye(n).mul(shift)), B: random(uniform, n, 1), C: random(uniform, p, n), horizon: 8 };
}

/** The step at the input of the open plant: no feedback, its reference taken as the input. */
function ours({ A, B, C, horizon }: Problem): Answer {
  const [n, p] = [A.rows, C.rows];
  const { records } = respond({
    plant: { A, B, C, D: Matrix.zeros(p, 1), H: C.subMatrix(0, 0, 0, n - 1), J: Matrix.zeros(1, 1) },
    period: null,
    K: Matrix.zeros(1, n),
    F: Matrix.ones(1, 1),
    observer: null,
    experiments: { amplitudes: [1], initialState: Array(n).fill(0), inputDisturbance: [0] },
    room: [{ up: null, down: null }],
    horizon,
  });
  const [{ samples, values }] = records;
  if (samples !== MOMENTS) throw new Error(`A response has ${samples} moments instead of ${MOMENTS}.`);
  return new Matrix(Array.from({ length: p }, (_, i) => moments.map((k) => values[(1 + i) * samples + k])));
}

/** The same in whole numbers: powers of the exponential of one stride act on [x; u]. */
function truth({ A, B, C, horizon }: Problem): bigint[][] {
  const stride = exactExponential(heldBlock({ A, B, period: (horizon / (MOMENTS - 1)) * STRIDE }));
  let state = fixed(new Matrix([...Array.from({ length: A.rows }, () => [0]), [1]]));
  const columns = moments.map(() => {
    const now = state;
    state = fixedProduct(stride, state);
    return fixedProduct(fixed(C), now.slice(0, A.rows));
  });
  return Array.from({ length: C.rows }, (_, i) => columns.map((column) => column[i][0]));
}

export const stepResponse: Kind<Problem, Answer> = {
  name: "step response",
  measure: "true error",
  problems: (uniform) =>
    [
      [1, 1],
      [3, 2],
      [6, 2],
      [12, 4],
    ].map(([n, p]) => problem(uniform, n, p)),
  question: ({ A, B, C, horizon }) => ({ ask: "step_response", A, B, C, horizon, moments: MOMENTS, stride: STRIDE }),
  ours,
  theirs: fromRows,
  difference: (_, one, other) => distance(one, other),
  // Each of the steps adds rounding, which the stable plant forgets at its slowest rate; the norm of A stands for the transient.
  allowed: ({ A, horizon }) => FACTOR * A.rows * Number.EPSILON * Math.sqrt(MOMENTS) * (1 + A.norm() * horizon),
  error: (given, answer) => {
    const apart = fixedDifference(truth(given), answer).map(Math.abs);
    return Math.max(...apart) / Math.max(...answer.to1DArray().map(Math.abs));
  },
};
