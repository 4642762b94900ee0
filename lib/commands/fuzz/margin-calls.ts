import { Matrix } from "ml-matrix";
import * as core from "@/control/index";
import type { CoreCall } from "./core-calls";
import type { HostileProblem } from "./hostile-problem";

/** Most hostile plants do not decay and would only be refused: two of three are made to. */
function system({ A, B, C, D, sampled, seed }: HostileProblem) {
  if (seed % 3 === 0) return { A, B, C, D };
  const size = 1 + A.to1DArray().reduce((sum, entry) => sum + Math.abs(entry), 0);
  return { A: sampled ? Matrix.mul(A, 1 / size) : Matrix.sub(A, Matrix.eye(A.rows, A.columns).mul(size)), B, C, D };
}

/** A loop with as many outputs as inputs, around a plant that decays, with a gain small enough to leave some of the loops stable. */
function loop(problem: HostileProblem) {
  const { A, B, C, D } = system(problem);
  const size = 1 + problem.K.to1DArray().reduce((most, entry) => Math.max(most, Math.abs(entry)), 0);
  return core.openLoop({ A, B, C, D }, Matrix.mul(problem.K, 0.1 / size), null, "inputs");
}

const timeOf = ({ sampled, period }: HostileProblem) => (sampled ? period : null);
const ordered = ({ value, lower, upper }: core.PeakValue) => lower <= value && value <= upper;

export const marginCalls: Record<string, CoreCall> = {
  frequencyGrid: (problem) => ({ value: core.frequencyGrid(system(problem), timeOf(problem)) }),
  frequencyResponse: (problem) => {
    const wide = problem.seed % 2 === 0 ? null : [0, 1e-300, 1e-3, 1, 2.5];
    return { value: core.frequencyResponse(system(problem), timeOf(problem), problem.sampled ? [0] : wide) };
  },
  responseSingularValues: (problem) => {
    const frequencies = problem.sampled ? [0] : [0, 1e-3, 1, 1e9];
    const response = core.frequencyResponse(system(problem), timeOf(problem), frequencies);
    return { value: core.responseSingularValues(response, response.inputs === response.outputs) };
  },
  peakGain: (problem) => {
    const value = core.peakGain(system(problem), timeOf(problem));
    return { value, holds: ordered(value) };
  },
  openLoop: ({ A, B, C, D, K, n, p, seed }) => {
    const observer = p > 0 && seed % 2 === 0 ? ({ kind: "full", L: Matrix.ones(n, C.rows) } as const) : null;
    return { value: core.openLoop({ A, B, C, D }, K, observer, seed % 3 === 0 ? "outputs" : "inputs") };
  },
  loopRobustness: (problem) => {
    const value = core.loopRobustness(loop(problem), timeOf(problem));
    return { value, holds: ordered(value.sensitivity) && ordered(value.complementarySensitivity) };
  },
};
