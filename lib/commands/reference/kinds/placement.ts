import type { Matrix } from "ml-matrix";
import type { Complex } from "@/control/plant/model";
import { placePoles } from "@/control/poles/place-poles";
import { exactly, plus, times } from "../exact-matrix";
import { eigenvalueErrors } from "../exact-polynomial";
import { FACTOR, fromRows, type Kind, type Rows, random } from "../kind";

type Problem = { readonly A: Matrix; readonly B: Matrix; readonly poles: readonly Complex[] };
/** The eigenvectors of A - BK decide how far rounding moves its poles. */
type Answer = { readonly K: Matrix; readonly conditioning: number };

/** As many pairs as the order allows with one real pole at least. */
function poles(n: number): Complex[] {
  const pairs = Math.floor((n - 1) / 2);
  const found: Complex[] = [];
  for (let k = 0; k < pairs; k++) found.push({ re: -1 - k / 3, im: 0.5 + k / 2 }, { re: -1 - k / 3, im: -0.5 - k / 2 });
  while (found.length < n) found.push({ re: -0.75 - found.length / 4, im: 0 });
  return found;
}

/** Both gains differ, as they may: the poles that they give are compared, each relative to its size. */
function missed({ A, B, poles: wanted }: Problem, { K }: Answer): number {
  const closed = plus(exactly(A), times(exactly(B), exactly(K)), -1);
  return Math.max(...eigenvalueErrors(closed, wanted).map((miss, k) => miss / Math.hypot(wanted[k].re, wanted[k].im)));
}

const slowest = (wanted: readonly Complex[]) => Math.min(...wanted.map(({ re, im }) => Math.hypot(re, im)));

/** What rounding of A - BK does to its poles. */
const allowed = ({ A, B, poles: wanted }: Problem, { K, conditioning }: Answer) =>
  (FACTOR * A.rows * Number.EPSILON * conditioning * (A.norm() + B.norm() * K.norm())) / slowest(wanted);

export const placement: Kind<Problem, Answer> = {
  name: "placement, closed-loop poles",
  measure: "true error",
  problems: (uniform) =>
    [
      [2, 1],
      [4, 2],
      [6, 3],
      [8, 3],
      [12, 4],
    ].map(([n, m]) => ({ A: random(uniform, n, n), B: random(uniform, n, m), poles: poles(n) })),
  question: ({ A, B, poles: wanted }) => ({ ask: "placement", A, B, poles: wanted.map(({ re, im }) => [re, im]) }),
  ours: ({ A, B, poles: wanted }) => {
    const { K, conditioning } = placePoles({ A, B, poles: wanted });
    return { K, conditioning: conditioning ?? Number.POSITIVE_INFINITY };
  },
  theirs: ({ K, conditioning }: { K: Rows; conditioning: number }) => ({ K: fromRows(K), conditioning }),
  // In units of what each loop's own conditioning allows.
  difference: (problem, one, other) => Math.max(...[one, other].map((each) => missed(problem, each) / allowed(problem, each))),
  allowed: () => 1,
  error: missed,
};
