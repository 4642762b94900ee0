import { Matrix } from "ml-matrix";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { solveLyapunov } from "@/control/linalg/solve-lyapunov";
import { exactly, exactNorm, plus, times, transposed } from "../exact-matrix";
import { distance, FACTOR, fromRows, type Kind, random, randomWeight } from "../kind";

type Problem = { readonly A: Matrix; readonly Q: Matrix };

/** Random, moved or scaled to be stable with some margin. */
function stable(uniform: () => number, n: number, sampled: boolean): Matrix {
  const M = random(uniform, n, n);
  const poles = eigenvalues(M);
  if (sampled) return M.mul(0.9 / Math.max(...poles.map(({ re, im }) => Math.hypot(re, im))));
  const shift = 0.2 + Math.max(...poles.map(({ re }) => re));
  return Matrix.sub(M, Matrix.eye(n).mul(shift));
}

export const lyapunov = (sampled: boolean): Kind<Problem, Matrix> => ({
  name: `${sampled ? "discrete" : "continuous"} Lyapunov`,
  measure: "residual",
  problems: (uniform) => [1, 2, 4, 8, 12, 20].map((n) => ({ A: stable(uniform, n, sampled), Q: randomWeight(uniform, n) })),
  question: (problem) => ({ ask: sampled ? "discrete_lyapunov" : "continuous_lyapunov", ...problem }),
  ours: ({ A, Q }) => solveLyapunov({ A, Q, timeBase: sampled ? "sampled" : "continuous" }).X,
  theirs: fromRows,
  difference: (_, one, other) => distance(one, other),
  allowed: ({ A, Q }, X) => {
    const taken = solveLyapunov({ A, Q: Matrix.eye(A.rows), timeBase: sampled ? "sampled" : "continuous" }).X.norm();
    const size = Q.norm() + X.norm() * (sampled ? 1 + A.norm() ** 2 : 2 * A.norm());
    return (FACTOR * A.rows * Number.EPSILON * taken * size) / X.norm();
  },
  error: ({ A, Q }, X) => {
    const [a, x] = [exactly(A), exactly(X)];
    const ax = times(a, x);
    const left = sampled ? plus(times(ax, transposed(a)), x, -1) : plus(ax, transposed(ax));
    return exactNorm(plus(left, exactly(Q))) / (Q.norm() + X.norm() * (sampled ? 1 + A.norm() ** 2 : 2 * A.norm()));
  },
});
