import { inverse, Matrix } from "ml-matrix";
import { solveLyapunov } from "@/control/linalg/solve-lyapunov";
import { solveRiccati } from "@/control/riccati/solve-riccati";
import { exactly, exactNorm, plus, times, transposed } from "../exact-matrix";
import { distance, FACTOR, fromRows, type Kind, type Rows, random, randomWeight } from "../kind";

type Problem = { readonly A: Matrix; readonly B: Matrix; readonly Q: Matrix; readonly R: Matrix; readonly S: Matrix };
type Answer = { readonly X: Matrix; readonly K: Matrix };

function problems(uniform: () => number): Problem[] {
  return [2, 4, 8, 12].flatMap((n) =>
    [1, 3].map((m) => {
      const S = random(uniform, n, m).mul(0.1);
      return { A: random(uniform, n, n), B: random(uniform, n, m), Q: randomWeight(uniform, n), R: randomWeight(uniform, m), S };
    }),
  );
}

/** First-order condition of X: how the solution of the closed loop's Lyapunov equation takes up changes of Q, A and B R⁻¹ B'. */
function condition({ A, B, Q, R, S }: Problem, { X, K }: Answer, sampled: boolean): number {
  const closed = Matrix.sub(A, B.mmul(K));
  const Rinv = inverse(R);
  const plain = Matrix.sub(A, B.mmul(Rinv).mmul(S.transpose()));
  const takes = (M: Matrix) =>
    solveLyapunov({ A: closed.transpose(), Q: symmetric(M), timeBase: sampled ? "sampled" : "continuous" }).X.norm();
  const moved = sampled ? X.mmul(closed) : X;
  const [byQ, byG] = [takes(Matrix.eye(A.rows)), takes(moved.transpose().mmul(moved))];
  const throughR = byQ * S.mmul(Rinv).mmul(S.transpose()).norm() + byG * B.mmul(Rinv).mmul(B.transpose()).norm();
  const byA = 2 * Math.sqrt(byQ * byG) * (A.norm() + plain.norm());
  return (byQ * Q.norm() + byA + R.norm() * Rinv.norm() * throughR) / X.norm();
}

const symmetric = (M: Matrix) => Matrix.add(M, M.transpose()).mul(0.5);

/** Of A'X + XA + Q - (XB + S) K (sampled: A'XA - X + Q - (A'XB + S) K) in whole numbers, over the size of Q and of X. */
function residual({ A, B, Q, S }: Problem, answer: Answer, sampled: boolean): number {
  const [a, b, x, k] = [A, B, answer.X, answer.K].map((M) => exactly(M));
  const xa = times(x, a);
  const left = sampled ? plus(times(transposed(a), xa), x, -1) : plus(xa, transposed(xa));
  const reach = sampled ? times(transposed(a), times(x, b)) : times(x, b);
  const gain = times(plus(reach, exactly(S)), k);
  const size = Q.norm() + answer.X.norm() * (sampled ? 1 + A.norm() ** 2 : 2 * A.norm());
  return exactNorm(plus(plus(left, exactly(Q)), gain, -1)) / size;
}

export const riccati = (sampled: boolean): Kind<Problem, Answer> => ({
  name: `${sampled ? "discrete" : "continuous"} Riccati, cross term`,
  measure: "residual",
  problems,
  question: ({ A, B, Q, R, S }) => ({ ask: sampled ? "discrete_riccati" : "continuous_riccati", A, B, Q, R, S }),
  ours: (problem) => solveRiccati({ ...problem, sampled }),
  theirs: ({ X, K }: { X: Rows; K: Rows }) => ({ X: fromRows(X), K: fromRows(K) }),
  difference: (_, one, other) => Math.max(distance(one.X, other.X), distance(one.K, other.K)),
  allowed: (problem, ours) => {
    const gain = 1 + (problem.B.norm() * ours.X.norm() * inverse(problem.R).norm()) / ours.K.norm();
    return FACTOR * problem.A.rows * Number.EPSILON * condition(problem, ours, sampled) * gain;
  },
  error: (problem, answer) => residual(problem, answer, sampled),
});
