import { Matrix } from "ml-matrix";
import * as core from "@/control/index";
import { USABLE_POLE_ERROR } from "@/control/poles/verify-placement";
import { isExactlyStable } from "./exact-stability";
import type { HostileProblem } from "./hostile-problem";
import { marginCalls } from "./margin-calls";

/** What a call gave back, the fact that it claims about it, and the loop that it claims to be stable. */
export type Answer = {
  readonly value: unknown;
  /** A check of the function's own promise: false is a finding. */
  readonly holds?: boolean;
  readonly closed?: { readonly A: Matrix; readonly B: Matrix; readonly K: Matrix };
};

export type CoreCall = (problem: HostileProblem) => Answer;

const within = (value: { readonly residual: number; readonly bound: number }) => value.residual <= value.bound;

/** A gain for poles inside the boundary is promised to stabilise. */
const allInside = ({ poles, sampled }: HostileProblem) =>
  poles.every(({ re, im }) => (sampled ? Math.hypot(re, im) < 1 : re < 0));

const regulators: Record<string, CoreCall> = {
  solveRiccati: ({ A, B, Q, R, S, sampled, seed }) => {
    const value = core.solveRiccati({ A, B, Q, R, S, sampled, allowIndefinite: seed % 4 === 0 });
    return { value, holds: within(value) && value.stabilityDistance > 0, closed: { A, B, K: value.K } };
  },
  designLqr: ({ A, B, Q, R, S, timeBase, degree, seed }) => {
    const weights = { stateWeight: Q, inputWeight: R, ...(seed % 2 === 0 ? { crossWeight: S } : {}) };
    const value = core.designLqr({ A, B, ...weights, degreeOfStability: degree, timeBase });
    return { value, holds: value.stabilityDistance > 0, closed: { A, B, K: value.K } };
  },
  weightsFromDeviations: ({ A, B }) => ({
    value: core.weightsFromDeviations(
      A.to1DArray().map((x) => (x === 0 ? null : Math.abs(x))),
      B.to1DArray().map(Math.abs),
    ),
  }),
  placePoles: (problem) => {
    const { A, B, poles, seed } = problem;
    const value = core.placePoles({ A, B, poles, allowDefective: seed % 3 === 0 });
    return {
      value,
      holds: value.poleError <= USABLE_POLE_ERROR,
      ...(allInside(problem) ? { closed: { A, B, K: value.K } } : {}),
    };
  },
  referenceGain: ({ A, B, H, J, K, sampled }) => ({ value: core.referenceGain({ A, B, H, J, K, sampled }) }),
  resolvePoles: ({ recipe, timeBase }) => ({
    value: recipe.method === "poles" ? core.resolvePoles(recipe.poles, timeBase) : [],
  }),
};

const observers: Record<string, CoreCall> = {
  observerByPoles: (problem) => {
    const { A, C, poles } = problem;
    const value = core.observerByPoles({ A, C, poles });
    const dual = { A: A.transpose(), B: C.transpose(), K: value.L.transpose() };
    return { value, holds: value.poleError <= USABLE_POLE_ERROR, ...(allInside(problem) ? { closed: dual } : {}) };
  },
  observerFromNoise: ({ A, C, Q, V, sampled }) => {
    const value = core.observerFromNoise({ A, C, processNoise: Q, measurementNoise: V, sampled });
    const dual = { A: A.transpose(), B: C.transpose(), K: value.L.transpose() };
    return { value, holds: within(value), closed: dual };
  },
  reducedObserver: ({ A, B, C, D, poles, p, n }) => {
    const value = core.reducedObserver({ A, B, C, D, poles: poles.slice(0, Math.max(0, n - p)) });
    return { value, holds: value.poleError <= USABLE_POLE_ERROR };
  },
};

const dynamics: Record<string, CoreCall> = {
  eigenvalues: ({ A }) => {
    const value = core.eigenvalues(A);
    return { value, holds: value.length === A.rows };
  },
  solveLyapunov: ({ A, Q, sampled }) => {
    const value = core.solveLyapunov({ A, Q, timeBase: sampled ? "sampled" : "continuous" });
    return { value, holds: within(value) };
  },
  matrixExponential: ({ A }) => ({ value: core.matrixExponential(A) }),
  holdEquivalent: ({ A, B, period }) => ({ value: core.holdEquivalent({ A, B, period }) }),
  discretiseCost: ({ A, B, Q, R, S, period, seed }) => ({
    value: core.discretiseCost({ A, B, Q, R, period, ...(seed % 2 === 0 ? { S } : {}) }),
  }),
  respondToStep: ({ A, B, C, D, period, sampled }) => ({
    value: core.respondToStep({ A, B, C, D, step: sampled ? null : period, samples: 40 }),
  }),
  respondEnsemble: ({ A, B, C, H, K, period, sampled, seed }) => {
    const flat = (M: Matrix) => Float64Array.from(M.to1DArray());
    const believed = { A, B, C, L: Matrix.zeros(A.rows, C.rows) };
    return {
      value: core.respondEnsemble({
        law: { K, F: Matrix.ones(B.columns, H.rows), observer: seed % 3 === 0 ? believed : null },
        plants: [{ a: flat(A), b: flat(B), c: flat(C), h: flat(H) }],
        period: sampled ? period : null,
        step: period,
        samples: 40,
      }),
    };
  },
  closeLoop: ({ A, B, C, D, H, J, K }) => ({ value: core.closeLoop({ A, B, C, D, H, J }, K, null, null) }),
  respond: ({ A, B, C, D, H, J, K, sampled, period, recipe, model, seed, p }) => {
    const full = seed % 3 === 0 && p > 0;
    const request: core.ResponseRequest = {
      plant: { A, B, C, D, H, J },
      period: sampled ? period : null,
      K,
      F: seed % 2 === 0 ? Matrix.ones(B.columns, H.rows) : null,
      observer: full ? { kind: "full", L: Matrix.zeros(A.rows, p) } : null,
      experiments: { ...recipe.test, amplitudes: model.commanded.map(({ amplitude }) => amplitude) },
      room: model.inputs.map(() => ({ up: 2, down: null })),
      horizon: recipe.test.horizon,
    };
    return { value: core.respond(request) };
  },
};

const bracketed = ({ lower, upper }: core.DistanceBracket) => lower <= upper;

/** The same plant with every mode made to decay, so that it has gramians. */
function decaying({ A, B, C, sampled }: HostileProblem): core.GramianProblem {
  const size = 1 + A.to1DArray().reduce((sum, entry) => sum + Math.abs(entry), 0);
  const settled = sampled ? Matrix.mul(A, 1 / size) : Matrix.sub(A, Matrix.eye(A.rows, A.columns).mul(size));
  return { A: settled, B, C, timeBase: sampled ? "sampled" : "continuous" };
}

const structure: Record<string, CoreCall> = {
  controllabilityReport: ({ A, B }) => ({ value: core.controllabilityReport(A, B) }),
  observabilityReport: ({ A, C }) => ({ value: core.observabilityReport(A, C) }),
  modes: ({ A, B, C, timeBase }) => ({ value: core.modes({ A, B, C }, timeBase) }),
  transmissionZeros: ({ A, B, C, D, n }) => {
    const value = core.transmissionZeros({ A, B, C, D });
    return { value, holds: value.length <= n };
  },
  distanceToUncontrollability: ({ A, B }) => {
    const value = core.distanceToUncontrollability(A, B, 40);
    return { value, holds: bracketed(value) };
  },
  distanceToUnobservability: ({ A, C }) => {
    const value = core.distanceToUnobservability(A, C, 40);
    return { value, holds: bracketed(value) };
  },
  gramians: (problem) => ({ value: core.gramians(decaying(problem)) }),
  hankelValues: (problem) => ({ value: core.hankelValues(decaying(problem)) }),
};

const pairing: Record<string, CoreCall> = {
  relativeGainArray: ({ A }) => ({ value: core.relativeGainArray(A) }),
  relativeGainAtRest: ({ A, C, timeBase }) => ({
    value: core.relativeGainAtRest(A, C.transpose(), C, Matrix.eye(C.rows), timeBase),
  }),
};

const documents: Record<string, CoreCall> = {
  checkPlant: ({ model }) => {
    const checks = core.checkPlant(model);
    const modes = checks.modes.state === "computed" ? checks.modes.value : [];
    const words = [core.describeChecks(checks, model), modes.map((mode) => core.describeMode(mode, model))];
    return { value: { checks, words: refuseOddWords(words) } };
  },
  computeDesign: ({ model, recipe, A, B }) => {
    const evidence = core.computeDesign(model, recipe);
    const gains = evidence.gains;
    const promised = gains.state === "computed" && recipe.method === "weights";
    const K = promised && new Matrix(gains.value.K.map((row) => [...row]));
    return { value: evidence, ...(K ? { closed: { A, B, K } } : {}) };
  },
  defaultRecipe: ({ model }) => ({ value: core.defaultRecipe(model) }),
  recipeProblems: ({ model, recipe }) => ({ value: core.recipeProblems(recipe, model) }),
};

/** By the name under which `control/index.ts` exports the function; words are checked beside what they speak of. */
export const CORE_CALLS: Readonly<Record<string, CoreCall>> = {
  ...regulators,
  ...observers,
  ...dynamics,
  ...structure,
  ...pairing,
  ...marginCalls,
  ...documents,
};

/** Sentences of a refusal. */
export function refusalWords(error: core.NumericalError, { model }: HostileProblem): unknown {
  return refuseOddWords(core.explainRefusal(error.code, error.data, model));
}

function refuseOddWords<T>(words: T): T {
  const odd = /NaN|Infinity|undefined|\[object|null/.exec(JSON.stringify(Object.values(words as object)));
  if (odd) throw new Error(`"${odd[0]}" stands in a sentence: ${JSON.stringify(words)}`);
  return words;
}

/** Whole numbers grow with the size: all small loops are tried exactly, of larger ones every sixteenth. */
export function staysStable({ closed }: Answer, { n, seed, sampled }: HostileProblem): boolean {
  const affordable = n <= 4 || (n <= 8 && seed % 16 === 0);
  return !closed || !affordable || isExactlyStable(closed.A, closed.B, closed.K, sampled);
}
