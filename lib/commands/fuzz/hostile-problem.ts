import type { Matrix } from "ml-matrix";
import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import type { Complex, PlantModel, TimeBase } from "@/control/plant/model";
import { seededUniform } from "@/tests/helpers/seeded";
import { hostileDynamics, hostileMatrix, hostileWeight, pick, type Random, whole } from "./hostile-matrix";

/** Everything that a function of the core may be asked about one plant; all of it follows from the seed. */
export type HostileProblem = {
  readonly seed: number;
  readonly n: number;
  readonly m: number;
  readonly p: number;
  readonly sampled: boolean;
  readonly timeBase: TimeBase;
  readonly period: number;
  /** n×n, n×m, p×n, p×m, q×n, q×m */
  readonly A: Matrix;
  readonly B: Matrix;
  readonly C: Matrix;
  readonly D: Matrix;
  readonly H: Matrix;
  readonly J: Matrix;
  /** n×n, m×m, n×m, p×p, m×n */
  readonly Q: Matrix;
  readonly R: Matrix;
  readonly S: Matrix;
  readonly V: Matrix;
  readonly K: Matrix;
  readonly degree: number;
  readonly poles: readonly Complex[];
  readonly model: PlantModel;
  readonly recipe: Recipe;
};

/** Mostly up to eight states, at times up to twenty; none at all now and then. */
function stateCount(random: Random): number {
  const kind = random();
  if (kind < 0.01) return 0;
  if (kind < 0.75) return whole(random, 1, 4);
  return kind < 0.99 ? whole(random, 5, 8) : whole(random, 9, 20);
}

export function hostileProblem(seed: number): HostileProblem {
  const random = seededUniform(seed);
  const n = stateCount(random);
  const [m, p, q] = [whole(random, random() < 0.02 ? 0 : 1, 3), whole(random, 0, 3), whole(random, 0, 2)];
  const sampled = random() < 0.4;
  const period = pick(random, [1, 0.01, 1e-3, 1e-9, 1e6]);
  const matrices = {
    A: hostileDynamics(random, n),
    B: hostileMatrix(random, n, m),
    C: hostileMatrix(random, p, n),
    D: random() < 0.7 ? hostileMatrix(random, p, m).mul(0) : hostileMatrix(random, p, m),
    H: hostileMatrix(random, q, n),
    J: random() < 0.7 ? hostileMatrix(random, q, m).mul(0) : hostileMatrix(random, q, m),
    Q: hostileWeight(random, n),
    R: hostileWeight(random, m),
    S: random() < 0.8 ? hostileMatrix(random, n, m).mul(0) : hostileMatrix(random, n, m),
    V: hostileWeight(random, p),
    K: random() < 0.3 ? hostileMatrix(random, m, n).mul(0) : hostileMatrix(random, m, n),
  };
  spoil(random, matrices);
  const timeBase: TimeBase = sampled ? { kind: "sampled", period } : { kind: "continuous" };
  const degree = random() < 0.7 ? 0 : pick(random, [0.1, 1, 1e-9, 1e3, 1e300]);
  const poles = hostilePoles(random, n, sampled);
  const shape = { n, m, p, sampled, timeBase, period };
  const model = hostileModel(random, shape, matrices);
  return { seed, ...shape, ...matrices, degree, poles, model, recipe: hostileRecipe(random, shape, matrices) };
}

type Shape = Pick<HostileProblem, "n" | "m" | "p" | "sampled" | "timeBase">;
type Matrices = Pick<HostileProblem, "A" | "B" | "C" | "D" | "H" | "J" | "Q" | "R" | "S" | "V" | "K">;

/** Once in a hundred problems a number that is none stands somewhere; as often a matrix has a row too many. */
function spoil(random: Random, matrices: Matrices): void {
  const fault = random();
  const M = pick(random, Object.values(matrices));
  if (fault > 0.99) M.addRow(M.rows, Array(M.columns).fill(1));
  if (fault >= 0.01) return;
  if (M.rows * M.columns === 0) return;
  M.set(whole(random, 0, M.rows - 1), whole(random, 0, M.columns - 1), pick(random, [Number.NaN, Infinity, -Infinity]));
}

/** Sets with pairs, repeated, fast and slow members; at times one too few, or a pair without its other half. */
function hostilePoles(random: Random, n: number, sampled: boolean): Complex[] {
  const poles: Complex[] = [];
  const size = sampled ? pick(random, [1, 0.9, 1e-6]) : pick(random, [1, 1, 10, 1e6, 1e-6, 1e200]);
  const repeated = random() < 0.2 ? size * random() : null;
  while (poles.length < n) {
    const re = (sampled ? 1 : -1) * (repeated ?? size * random());
    if (n - poles.length >= 2 && random() < 0.4) {
      const im = size * random() * 0.5;
      poles.push({ re, im }, { re, im: -im });
    } else poles.push({ re, im: 0 });
  }
  const fault = random();
  if (fault < 0.01) poles.pop();
  else if (fault < 0.02 && n > 0) poles[0] = { re: poles[0].re, im: poles[0].im + 1 };
  return poles;
}

function hostileModel(random: Random, { n, m, p, timeBase }: Shape, { A, B, C, D, H, J }: Matrices): PlantModel {
  const scale = () => (random() < 0.5 ? null : 10 ** whole(random, -3, 3));
  const signals = (name: string, count: number) =>
    Array.from({ length: count }, (_, i) => ({ name: `${name}${i + 1}`, unit: "1", axis: null, scale: scale() }));
  const rows = (M: Matrix) => M.to2DArray();
  const limits = { lower: -1, upper: random() < 0.5 ? null : 2 };
  return {
    timeBase,
    axes: [],
    states: signals("x", n),
    inputs: signals("u", m).map((input) => ({ ...input, ...limits })),
    outputs: signals("y", p),
    disturbances: [],
    commanded: signals("z", H.rows).map(({ name, unit, axis }) => ({
      name,
      unit,
      axis,
      amplitude: pick(random, [1, 1e-6, 1e9]),
    })),
    ...{ A: rows(A), B: rows(B), C: rows(C), D: rows(D), H: rows(H), J: rows(J), E: Array.from({ length: n }, () => []) },
    operatingPoint: { states: Array(n).fill(0), inputs: Array(m).fill(0), outputs: Array(p).fill(0) },
  };
}

function hostileRecipe(random: Random, { n, m, p, sampled }: Shape, { Q, R, S, V }: Matrices): Recipe {
  const entries = (count: number): PoleEntry[] =>
    Array.from({ length: count }, () => ({ kind: "real", value: sampled ? 0.9 * random() : -10 * random() }));
  const observers: ObserverRecipe[] = [
    { kind: "none" },
    { kind: "poles", poles: entries(n) },
    { kind: "noise", process: Q.to2DArray(), measurement: V.to2DArray() },
    { kind: "reduced", poles: entries(Math.max(0, n - p)) },
  ];
  const base = {
    version: 1 as const,
    observer: p === 0 ? observers[0] : pick(random, observers),
    reference: { kind: random() < 0.3 ? ("none" as const) : ("feed-through" as const) },
    test: {
      horizon: random() < 0.8 ? null : pick(random, [1, 1e-6, 1e6]),
      initialState: Array.from({ length: n }, () => pick(random, [0, 1, 1e-3, 1e150])),
      inputDisturbance: Array.from({ length: m }, () => pick(random, [0, 0, 1])),
    },
    reasons: {},
  };
  if (random() < 0.4) return { ...base, method: "poles", poles: entries(n) };
  return {
    ...base,
    method: "weights",
    weights: { form: "matrices", state: Q.to2DArray(), input: R.to2DArray() },
    crossWeight: random() < 0.7 ? null : S.to2DArray(),
    degreeOfStability: random() < 0.8 ? null : pick(random, [0, 0.1, 5]),
  };
}
