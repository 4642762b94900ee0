import { Matrix } from "ml-matrix";
import { solveRiccati } from "@/control/riccati/solve-riccati";
import { seededMatrix, seededUniform } from "@/tests/helpers/seeded";
import type { TimedCase } from "./timed-case";

const SIZES = [4, 8, 12, 20, 50, 100, 200];
const SMALL = 20;

/** Well-conditioned, with a cross term; a quarter as many inputs as states. */
function problem(n: number, sampled: boolean) {
  const random = seededUniform(9_000 + n);
  const m = Math.ceil(n / 4);
  const M = seededMatrix(random, n, n);
  return {
    A: seededMatrix(random, n, n).mul(1 / Math.sqrt(n)),
    B: seededMatrix(random, n, m),
    Q: Matrix.add(
      M.transpose()
        .mmul(M)
        .mul(1 / n),
      Matrix.eye(n),
    ),
    R: Matrix.eye(m),
    S: seededMatrix(random, n, m).mul(0.3 / Math.sqrt(n)),
    sampled,
  };
}

/** Refined to correct rounding here, as SciPy leaves it there. */
export function riccatiCases(sampled: boolean): TimedCase[] {
  return [true, false].flatMap((accelerated) =>
    SIZES.map((n): TimedCase => {
      const given = problem(n, sampled);
      const { A, B, Q, R, S } = given;
      const rows = Object.fromEntries(Object.entries({ A, B, Q, R, S }).map(([name, M]) => [name, M.to2DArray()]));
      const beyond = accelerated ? 1 : null;
      return {
        name: `${sampled ? "discrete" : "continuous"} Riccati, ${n} states${accelerated ? "" : ", loops alone"}`,
        target: n > SMALL ? beyond : accelerated ? 0.5 : 1,
        accelerated,
        ours: () => solveRiccati(given),
        question: { ask: sampled ? "discrete_riccati" : "continuous_riccati", ...rows },
      };
    }),
  );
}
