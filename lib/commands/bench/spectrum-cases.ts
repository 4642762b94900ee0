import { Matrix } from "ml-matrix";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import { solveLyapunov } from "@/control/linalg/solve-lyapunov";
import { matrixExponential } from "@/control/response/matrix-exponential";
import { seededMatrix, seededUniform } from "@/tests/helpers/seeded";
import type { TimedCase } from "./timed-case";

const SIZES = [4, 8, 12, 20];

function stable(n: number): Matrix {
  const M = seededMatrix(seededUniform(7_000 + n), n, n);
  return Matrix.sub(M, Matrix.eye(n).mul(n));
}

export function spectrumCases(): TimedCase[] {
  return SIZES.flatMap((n): TimedCase[] => {
    const A = stable(n);
    const [Q, rows] = [Matrix.eye(n), A.to2DArray()];
    return [
      {
        name: `Lyapunov, refined, ${n} states`,
        target: 1,
        ours: () => solveLyapunov({ A, Q, timeBase: "continuous" }),
        question: { ask: "lyapunov", A: rows, Q: Q.to2DArray() },
      },
      { name: `eigenvalues, ${n} states`, target: 1, ours: () => eigenvalues(A), question: { ask: "eigenvalues", A: rows } },
      {
        name: `matrix exponential, ${n} states`,
        target: null,
        ours: () => matrixExponential(A),
        question: { ask: "exponential", A: rows },
      },
    ];
  });
}
