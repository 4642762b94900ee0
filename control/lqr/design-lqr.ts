import { Matrix } from "ml-matrix";
import { NumericalError } from "../errors";
import { eigenvalues } from "../linalg/eigenvalues";
import type { Complex, TimeBase } from "../plant/model";
import { boundaryMargin } from "../riccati/check-modes";
import { type RiccatiProblem, type RiccatiSolution, solveRiccati } from "../riccati/solve-riccati";
import { growthFactor } from "./growth-factor";

export type LqrProblem = {
  readonly A: Matrix;
  readonly B: Matrix;
  readonly stateWeight: Matrix;
  readonly inputWeight: Matrix;
  readonly crossWeight?: Matrix;
  /** 1/s; every closed-loop pole decays at least this fast. */
  readonly degreeOfStability?: number;
  readonly timeBase: TimeBase;
};

/** e^30 per sample is far beyond any plant whose samples mean anything. */
const LARGEST_GROWTH = 30;

/**
 * Gain K of u = -K x that minimises the integral (sampled: the sum) of x'Qx + 2 x'Su + u'Ru, with every pole at least as
 * fast as the degree of stability α: the cost is weighted by e^(2αt), which moves A to A + αI (sampled: A and B times e^(αh)).
 *
 * Shapes    A n×n, B n×m, stateWeight Q n×n, inputWeight R m×m, crossWeight S n×m → as `solveRiccati`
 * Units     α in 1/s, period h in s; X solves the equation of the moved plant; poles are those of A - BK in the plant's plane
 * Throws    as `solveRiccati`, poles named in the plant's plane; bad-option (degreeOfStability); not-stabilising
 * Accuracy  as `solveRiccati` for the moved plant; the factor e^(αh) is good to 1e-12
 * Source    Anderson & Moore, Optimal Control: Linear Quadratic Methods, Prentice-Hall 1990, section 3.5
 */
export function designLqr(problem: LqrProblem): RiccatiSolution {
  const { A, B, timeBase } = problem;
  const alpha = checkedDegree(problem);
  const sampled = timeBase.kind === "sampled";
  const growth = sampled ? growthFactor(alpha * timeBase.period) : 1;
  const solution = inPlantPlane(movedProblem(problem, alpha, growth), (pole) =>
    sampled ? { re: pole.re / growth, im: pole.im / growth } : { re: pole.re - alpha, im: pole.im },
  );
  if (alpha === 0) return solution;
  const closedLoopPoles = eigenvalues(Matrix.sub(A, B.mmul(solution.K)));
  const stabilityDistance = Math.min(...closedLoopPoles.map((pole) => boundaryMargin(pole, sampled)));
  const outside = closedLoopPoles.find((pole) => !(boundaryMargin(pole, sampled) > 0));
  if (outside) throw new NumericalError("not-stabilising", { pole: outside });
  return { ...solution, closedLoopPoles, stabilityDistance };
}

function checkedDegree({ degreeOfStability: alpha = 0, timeBase }: LqrProblem): number {
  const largest = timeBase.kind === "sampled" ? LARGEST_GROWTH / timeBase.period : Number.MAX_VALUE;
  if (timeBase.kind === "sampled" && !(timeBase.period > 0 && Number.isFinite(timeBase.period)))
    throw new NumericalError("period-missing");
  if (!(alpha >= 0 && alpha <= largest)) throw new NumericalError("bad-option", { option: "degreeOfStability", given: alpha });
  return alpha;
}

function movedProblem(problem: LqrProblem, alpha: number, growth: number): RiccatiProblem {
  const { A, B, stateWeight: Q, inputWeight: R, crossWeight: S, timeBase } = problem;
  const sampled = timeBase.kind === "sampled";
  const weights = S ? { Q, R, S, sampled } : { Q, R, sampled };
  if (alpha === 0) return { A, B, ...weights };
  if (sampled) return { A: Matrix.mul(A, growth), B: Matrix.mul(B, growth), ...weights };
  const moved = A.clone();
  for (let i = 0; i < Math.min(A.rows, A.columns); i++) moved.set(i, i, A.get(i, i) + alpha);
  return { A: moved, B, ...weights };
}

/** Solves, with a pole that a refusal names mapped back to the plant as given. */
function inPlantPlane(problem: RiccatiProblem, back: (pole: Complex) => Complex): RiccatiSolution {
  try {
    return solveRiccati(problem);
  } catch (error) {
    if (!(error instanceof NumericalError) || !isComplex(error.data.pole)) throw error;
    throw new NumericalError(error.code, { ...error.data, pole: back(error.data.pole) });
  }
}

function isComplex(value: unknown): value is Complex {
  return typeof value === "object" && value !== null && "re" in value && "im" in value;
}
