import { afterAll, beforeAll, expect, test } from "vitest";
import type { ObserverRecipe } from "@/control/design/recipe";
import { closePool } from "@/db/client";
import { closeNumericPool } from "@/lib/jobs/run-numeric";
import type { Computation } from "@/lib/schemas/design";
import type { ChecksReply } from "@/lib/schemas/evidence";
import type { PlantContent } from "@/lib/schemas/plant";
import { createAccessToken } from "@/lib/services/account/access-tokens";
import { type Api, apiOf } from "../helpers/api";
import { problemIn } from "../helpers/call-route";
import { newTeam } from "../helpers/people";
import { testDatabase } from "../helpers/test-database";

// Worked examples of the trade, through the stateless route as a program calls it: a plant as typed and a recipe go in.
await testDatabase();
let api: Api;
beforeAll(async () => {
  const { secret } = await createAccessToken(await newTeam(), { name: "Script", scope: "read", expiresInDays: 1 });
  api = apiOf({ authorization: `Bearer ${secret}` });
});
afterAll(async () => {
  await closeNumericPool();
  await closePool();
});

type Entries = readonly (readonly (string | number)[])[];
type Matrices = { readonly A: Entries; readonly B: Entries; readonly C: Entries };
const typed = (rows: Entries) => rows.map((row) => row.map(String));
const named = (letter: string, count: number) =>
  Array.from({ length: count }, (_, index) => ({ name: `${letter}${index + 1}`, unit: "1", axis: null, scale: null }));

function plantOf({ A, B, C }: Matrices, changes: Partial<PlantContent> = {}): PlantContent {
  return {
    ...{ version: 1, timeBase: { kind: "continuous" }, axes: [], parameters: [], disturbances: [], commanded: null },
    ...{ D: null, E: null, H: null, J: null, operatingPoint: null, source: "" },
    states: named("x", A.length),
    inputs: named("u", B[0].length).map((input) => ({ ...input, lower: null, upper: null })),
    outputs: named("y", C.length),
    ...{ A: typed(A), B: typed(B), C: typed(C) },
    ...changes,
  };
}
type Rows = readonly (readonly number[])[];
const rest = (A: Entries, B: Entries) => ({
  version: 1,
  reference: { kind: "none" },
  test: { horizon: null, initialState: A.map(() => 1), inputDisturbance: B[0].map(() => 0) },
  reasons: {},
});
const byWeights = ({ A, B }: Matrices, state: Rows, input: Rows, observer: ObserverRecipe = { kind: "none" }) => ({
  ...rest(A, B),
  ...{ method: "weights", weights: { form: "matrices", state, input }, crossWeight: null, degreeOfStability: null, observer },
});
const byPoles = ({ A, B }: Matrices, poles: readonly unknown[], observer: ObserverRecipe = { kind: "none" }) => ({
  ...rest(A, B),
  ...{ method: "poles", poles, observer },
});
const compute = (content: PlantContent, recipe: unknown) =>
  api.post<Computation>("/api/v1/computations", { plant: { content }, recipe });

function value<T>(part: { readonly state: string; readonly value?: T }): T {
  if (part.value === undefined) throw new Error(`this part is ${part.state}`);
  return part.value;
}
/** Each entry to so many significant digits of the printed one. */
function expectDigits(given: Rows, printed: Rows, digits: number) {
  expect(given.map(({ length }) => length)).toEqual(printed.map(({ length }) => length));
  given.forEach((row, i) => {
    row.forEach((entry, j) => {
      expect(Math.abs(entry / printed[i][j] - 1), `row ${i + 1}, column ${j + 1}: ${entry}`).toBeLessThan(
        0.5 * 10 ** (1 - digits),
      );
    });
  });
}

// R. Tedrake, Underactuated Robotics (2024), chapter 8: Q = I, R = 1 gives K = [1, √3], P = [√3, 1; 1, √3]. The observer:
// T. Bretl, AE353 course notebooks (2021), days 28 and 29: poles -1 and -2 give L = [3, 2].
test("the double integrator has the gain [1, √3], the poles (-√3 ± i) / 2 and, for poles at -1 and -2, the observer [3, 2]", async () => {
  const matrices = {
    A: [
      [0, 1],
      [0, 0],
    ],
    B: [[0], [1]],
    C: [[1, 0]],
  };
  const observer = { kind: "poles", poles: [-1, -2].map((at) => ({ kind: "real", value: at }) as const) } as const;
  const { evidence, checks, responses, cautions } = await compute(
    plantOf(matrices),
    byWeights(
      matrices,
      [
        [1, 0],
        [0, 1],
      ],
      [[1]],
      observer,
    ),
  );
  const { K, P, residual, bound } = value(evidence.gains);
  const root = Math.sqrt(3);
  expectDigits(K, [[1, root]], 15);
  expectDigits(
    P ?? [],
    [
      [root, 1],
      [1, root],
    ],
    15,
  );
  expect(residual).toBeLessThanOrEqual(bound);
  const [pole] = value(evidence.poles);
  expectDigits([[pole.pole.re, pole.pole.im]], [[-root / 2, 0.5]], 15);
  expectDigits([[pole.naturalFrequency ?? 0, pole.damping ?? 0]], [[1, root / 2]], 14);
  expectDigits((value(evidence.observer) as { L: number[][] }).L, [[3], [2]], 14);
  expect([value(checks.controllability).rank, value(checks.observability).rank]).toEqual([2, 2]);
  expect(responses.map(({ kind, loop }) => `${kind} ${loop}`)).toContain("initial observer");
  expect(cautions.length).toBeGreaterThan(0);
});

// H. Kwakernaak & R. Sivan, Linear Optimal Control Systems, Wiley 1972, chapter 3, stirred tank, ρ = 1; printed gain from memory.
test("the stirred tank of Kwakernaak and Sivan has their two-input gain to four digits", async () => {
  const matrices = {
    A: [
      [-0.01, 0],
      [0, -0.02],
    ],
    B: [
      [1, 1],
      [-0.25, 0.75],
    ],
    C: [
      [0.01, 0],
      [0, 1],
    ],
  };
  const state = [
    [50 * 0.01 ** 2, 0],
    [0, 0.02],
  ];
  const { evidence } = await compute(
    plantOf(matrices),
    byWeights(matrices, state, [
      [1 / 3, 0],
      [0, 3],
    ]),
  );
  expectDigits(
    value(evidence.gains).K,
    [
      [0.1009, -0.09708],
      [0.01681, 0.05475],
    ],
    4,
  );
});

// The same book, chapter 4: position servo, disturbance of intensity 10 through 0.1, measurement noise of intensity 1e-7; from memory.
test("the optimal observer of their position servo is found to the digits printed", async () => {
  const matrices = {
    A: [
      [0, 1],
      [0, -4.6],
    ],
    B: [[0], [0.787]],
    C: [[1, 0]],
  };
  const observer: ObserverRecipe = {
    kind: "noise",
    process: [
      [0, 0],
      [0, 10 * 0.1 ** 2],
    ],
    measurement: [[1e-7]],
  };
  const { evidence } = await compute(
    plantOf(matrices),
    byWeights(
      matrices,
      [
        [1, 0],
        [0, 0],
      ],
      [[2e-5]],
      observer,
    ),
  );
  expectDigits(value(evidence.gains).K, [[223.6, 18.7]], 4);
  const { L, poles } = value(evidence.observer) as { L: number[][]; poles: { pole: { re: number; im: number } }[] };
  expectDigits(L, [[40.36], [814.3]], 4);
  expectDigits([[poles[0].pole.re, poles[0].pole.im]], [[-22.48, 22.24]], 4);
});

// G. Franklin, D. Powell & M. Workman, Digital Control of Dynamic Systems, chapter 8, satellite at 0.1 s; from memory. Their K is
// rounded, so it is held against the polynomial (z - 0.8)² + 0.25²; their L is printed in full.
test("the sampled satellite has the gain of its two poles and the predicting observer [1.2, 5.2]", async () => {
  const matrices = {
    A: [
      [1, 0.1],
      [0, 1],
    ],
    B: [[0.005], [0.1]],
    C: [[1, 0]],
  };
  const pair = (re: number, im: number) => ({ kind: "pair", re, im }) as const;
  const content = plantOf(matrices, { timeBase: { kind: "sampled", period: 0.1 } });
  const recipe = byPoles(matrices, [pair(0.8, 0.25)], { kind: "poles", poles: [pair(0.4, 0.4)] });
  const { evidence } = await compute(content, recipe);
  expectDigits(value(evidence.gains).K, [[10.25, 3.4875]], 13);
  expectDigits((value(evidence.observer) as { L: number[][] }).L, [[1.2], [5.2]], 13);
});

// K. H. Johansson, The Quadruple-Tank Process, IEEE Trans. Control Systems Technology 8 (2000) 456-465: parameters p. 457, time
// constants and gains p. 458, zeros and relative gain p. 460. The zeros are printed to two digits from unrounded parameters: 5 %.
test("the four coupled tanks of Johansson, typed with their physical parameters, have the printed time constants, zeros and relative gain", async () => {
  const values = {
    S1: 28,
    S2: 32,
    o1: 0.071,
    o2: 0.057,
    h1: 12.4,
    h2: 12.7,
    h3: 1.8,
    h4: 1.4,
    k1: 3.33,
    k2: 3.35,
    g1: 0.7,
    g2: 0.6,
    grav: 981,
  };
  const time = {
    T1: "S1/o1*sqrt(2*h1/grav)",
    T2: "S2/o2*sqrt(2*h2/grav)",
    T3: "S1/o1*sqrt(2*h3/grav)",
    T4: "S2/o2*sqrt(2*h4/grav)",
  };
  const parameters = Object.entries({ ...time, ...values }).map(([name, expression]) => ({
    name,
    expression: String(expression),
    unit: "1",
    note: "",
  }));
  const matrices = {
    A: [
      ["-1/T1", 0, "1/T3", 0],
      [0, "-1/T2", 0, "1/T4"],
      [0, 0, "-1/T3", 0],
      [0, 0, 0, "-1/T4"],
    ],
    B: [
      ["g1*k1/S1", 0],
      [0, "g2*k2/S2"],
      [0, "(1-g2)*k2/S1"],
      ["(1-g1)*k1/S2", 0],
    ],
    C: [
      [0.5, 0, 0, 0],
      [0, 0.5, 0, 0],
    ],
  };
  const checks = await api.post<ChecksReply>("/api/v1/checks", { content: plantOf(matrices, { parameters }) });
  const slowness = value(checks.modes).map(({ timeConstant }) => Math.trunc((timeConstant ?? 0) + 0.01));
  expect(slowness.sort((a, b) => a - b)).toEqual([23, 30, 62, 90]);
  const zeros = value(checks.zeros)
    .map(({ value: { re } }) => re)
    .sort((a, b) => a - b);
  for (const [index, printed] of [-0.06, -0.018].entries()) expect(Math.abs(zeros[index] / printed - 1)).toBeLessThan(0.05);
  expect(value(checks.zeros).every(({ minimumPhase }) => minimumPhase)).toBe(true);
  expect(value(checks.coupling).relativeGain?.[0][0]).toBeCloseTo(1.4, 1);
});

// T. Bretl, AE353 course notebooks (2021), day 19: a wheel on a platform. The rank is 2 of 3; a routine that does not look returns
// a gain with poles near ±3e6 for the wanted -1, -2, -3.
test("the wheel on a platform is refused, naming the mode at zero, where an unchecked routine returns a wild gain", async () => {
  const matrices = {
    A: [
      [0, 1, 0],
      [0, -0.1, 0.1],
      [0, 0.1, -3.3],
    ],
    B: [[0], [1], [-33]],
    C: [[1, 0, 0]],
  };
  const content = plantOf(matrices);
  const checks = await api.post<ChecksReply>("/api/v1/checks", { content });
  expect([value(checks.controllability).rank, value(checks.stabilizable)]).toEqual([2, false]);
  const recipe = byPoles(
    matrices,
    [-1, -2, -3].map((at) => ({ kind: "real", value: at })),
  );
  const refusal = await problemIn(await api.ask("POST", "/api/v1/computations", { body: { plant: { content }, recipe } }));
  expect(refusal).toMatchObject({ status: 422, code: "not-controllable", data: { pole: { re: expect.closeTo(0, 12), im: 0 } } });
  expect(refusal.detail).toMatch(/\bx[123]\b/);
});
