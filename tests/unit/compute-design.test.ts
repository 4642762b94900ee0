import { Matrix } from "ml-matrix";
import { describe, expect, test } from "vitest";
import { computeDesign, METHOD_VERSION } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { Evidence } from "@/control/design/evidence";
import type { Recipe, WeightsRecipe } from "@/control/design/recipe";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import type { PlantModel, Rows, TimeBase } from "@/control/plant/model";
import type { Part } from "@/control/plant/report";

/** A plant with generated names; the first min(inputs, outputs) outputs are commanded. */
function plantOf(A: Rows, B: Rows, C: Rows, timeBase: TimeBase = { kind: "continuous" }): PlantModel {
  const signal = (name: string) => ({ name, unit: "1", axis: null, scale: 1 });
  const [n, m, p] = [A.length, B[0].length, C.length];
  const q = Math.min(m, p);
  const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => Array<number>(columns).fill(0));
  const names = (letter: string, count: number) => Array.from({ length: count }, (_, i) => signal(`${letter}${i + 1}`));
  return {
    timeBase,
    axes: [],
    states: names("x", n),
    inputs: names("u", m).map((input) => ({ ...input, lower: -10, upper: 20 })),
    outputs: names("y", p),
    disturbances: [],
    commanded: names("z", q).map(({ name, unit, axis }) => ({ name, unit, axis, amplitude: 1 })),
    A,
    B,
    C,
    D: zeros(p, m),
    E: A.map(() => []),
    H: C.slice(0, q),
    J: zeros(q, m),
    operatingPoint: { states: Array(n).fill(0), inputs: Array(m).fill(5), outputs: Array(p).fill(0) },
  };
}

const DOUBLE_INTEGRATOR = plantOf(
  [
    [0, 1],
    [0, 0],
  ],
  [[0], [1]],
  [[1, 0]],
);
/** Two carts joined by a spring, pushed one each; positions measured. */
const CARTS = plantOf(
  [
    [0, 1, 0, 0],
    [-2, -0.1, 2, 0.1],
    [0, 0, 0, 1],
    [1, 0.05, -1, -0.05],
  ],
  [
    [0, 0],
    [1, 0],
    [0, 0],
    [0, 0.5],
  ],
  [
    [1, 0, 0, 0],
    [0, 0, 1, 0],
  ],
);

function computed<T>(part: Part<T> | { readonly state: "absent" }): T {
  if (part.state !== "computed") throw new Error(`not computed: ${JSON.stringify(part)}`);
  return part.value;
}
const real = (...values: number[]) => values.map((value) => ({ kind: "real" as const, value }));
const byPoles = (model: PlantModel, poles: Extract<Recipe, { method: "poles" }>["poles"]): Recipe => {
  const { version, observer, reference, test: shown, reasons } = defaultRecipe(model);
  return { version, observer, reference, test: shown, reasons, method: "poles", poles };
};
const withObserver = (model: PlantModel, observer: Recipe["observer"]): WeightsRecipe => ({ ...defaultRecipe(model), observer });

describe("a design by weights", () => {
  // x'' = u with unit weights: K = [1 √3], P = [√3 1; 1 √3], poles of damping √3/2 at 1 rad/s; standard textbook example.
  test("of the double integrator has the textbook gain, poles and evidence", () => {
    const evidence = computeDesign(DOUBLE_INTEGRATOR, defaultRecipe(DOUBLE_INTEGRATOR));
    const { K, P, residual, bound, errorBound, poleError, eigenvectorCondition } = computed(evidence.gains);
    expect(K[0][0]).toBeCloseTo(1, 15);
    expect(K[0][1]).toBeCloseTo(Math.sqrt(3), 15);
    expect(P?.[0][0]).toBeCloseTo(Math.sqrt(3), 15);
    expect(residual).toBeLessThanOrEqual(bound);
    expect(errorBound).toBeLessThan(1e-14);
    expect(poleError).toBeNull();
    expect(eigenvectorCondition).toBeCloseTo(Math.sqrt((1 + Math.sqrt(3) / 2) / (1 - Math.sqrt(3) / 2)), 12); // |v1·v2| = √3/2
    const [pole] = computed(evidence.poles);
    expect(computed(evidence.poles)).toHaveLength(1);
    expect(pole.naturalFrequency).toBeCloseTo(1, 14);
    expect(pole.damping).toBeCloseTo(Math.sqrt(3) / 2, 14);
    expect(computed(evidence.reference)).toMatchObject({ reached: [true], obstacle: null });
    expect(evidence.observer).toEqual({ state: "absent" });
    const { summary, figures } = computed(evidence.responses);
    expect(summary.observer).toBeNull();
    expect(figures[0].effort[0]).toMatchObject({ at: 0 });
    expect(figures[0].effort[0].peak).toBeCloseTo(1, 14);
    expect(figures[0].effort[0].overLimit).toBeCloseTo(1 / 15, 12); // 5 is held, 20 is the limit
    expect(evidence.methodVersion).toBe(METHOD_VERSION);
  });

  test("honours a prescribed degree of stability", () => {
    const evidence = computeDesign(CARTS, { ...defaultRecipe(CARTS), degreeOfStability: 1.5 });
    for (const { pole } of computed(evidence.poles)) expect(pole.re).toBeLessThan(-1.5);
  });

  test("takes full weights and a cross weight", () => {
    const weights = {
      form: "matrices" as const,
      state: [
        [2, 0.5],
        [0.5, 1],
      ],
      input: [[4]],
    };
    const evidence = computeDesign(DOUBLE_INTEGRATOR, {
      ...defaultRecipe(DOUBLE_INTEGRATOR),
      weights,
      crossWeight: [[0.1], [0.2]],
    });
    const K = computed(evidence.gains).K[0];
    expect(K[0]).toBeCloseTo(Math.sqrt(2 / 4), 14); // K1² R = Q11, whatever the rest
  });
});

describe("a design by poles", () => {
  test("puts the poles where they are wanted, in frequency and damping too", () => {
    const recipe = byPoles(CARTS, [
      { kind: "damping", frequency: 3, damping: 0.6 },
      ...real(-4),
      { kind: "time-constant", seconds: 0.2 },
    ]);
    const evidence = computeDesign(CARTS, recipe);
    const gains = computed(evidence.gains);
    const closed = Matrix.sub(
      new Matrix([...CARTS.A.map((row) => [...row])]),
      new Matrix(CARTS.B.map((row) => [...row])).mmul(new Matrix(gains.K.map((row) => [...row]))),
    );
    const poles = eigenvalues(closed);
    const wanted = [
      { re: -5, im: 0 },
      { re: -4, im: 0 },
      { re: -1.8, im: 2.4 },
      { re: -1.8, im: -2.4 },
    ];
    poles.forEach(({ re, im }, k) => {
      expect(re).toBeCloseTo(wanted[k].re, 11);
      expect(im).toBeCloseTo(wanted[k].im, 11);
    });
    expect(gains.P).toBeNull();
    expect(gains.poleError).toBeLessThan(1e-12);
    expect(computed(evidence.poles).map(({ mainState }) => mainState !== null)).toEqual([true, true, true]);
  });

  test("refuses a pole that does not decay, and everything that needs the gain with it", () => {
    const evidence = computeDesign(CARTS, {
      ...byPoles(CARTS, real(-1, -2, 0.5, -3)),
      observer: { kind: "poles", poles: real(-4, -5, -6, -7) },
    });
    const refusal = { state: "refused", code: "unstable-pole", data: { index: 2 } };
    for (const part of [evidence.gains, evidence.poles, evidence.reference, evidence.responses])
      expect(part).toMatchObject(refusal);
    expect(evidence.observer.state).toBe("computed");
  });
});

describe("observers", () => {
  test.each<[string, Recipe["observer"], string]>([
    ["by poles", { kind: "poles", poles: real(-4, -5, -6, -7) }, "full"],
    [
      "from noise",
      {
        kind: "noise",
        process: CARTS.A.map((_, i) => CARTS.A.map((__, j) => (i === j ? 1 : 0))),
        measurement: [
          [0.1, 0],
          [0, 0.1],
        ],
      },
      "full",
    ],
    ["of reduced order", { kind: "reduced", poles: real(-4, -5) }, "reduced"],
  ])("%s stand in the loop beside the full state", (_, observer, kind) => {
    const evidence = computeDesign(CARTS, withObserver(CARTS, observer));
    const found = computed(evidence.observer);
    expect(found.kind).toBe(kind);
    expect(found.residual).toBeLessThanOrEqual(found.bound);
    expect(found.poles.every(({ pole }) => pole.re < 0)).toBe(true);
    const { records, summary } = computed(evidence.responses);
    expect(summary.observer).not.toBeNull();
    const initial = records.find((record) => record.kind === "initial" && record.loop === "observer");
    const signals = 2 + 2 + 4 + 4 + 2;
    expect(initial?.values.length).toBe(signals * (initial?.samples ?? 0));
    if (kind !== "full" || !initial) return;
    const estimatesAtStart = [8, 9, 10, 11].map((row) => initial.values[row * initial.samples]);
    expect(estimatesAtStart).toEqual([0, 0, 0, 0]);
  });

  test("one that cannot be made leaves the responses with the full state", () => {
    const blind = {
      ...CARTS,
      C: [
        [0, 0, 0, 0],
        [0, 0, 0, 0],
      ],
    };
    const evidence = computeDesign(blind, withObserver(blind, { kind: "poles", poles: real(-4, -5, -6, -7) }));
    expect(evidence.observer).toMatchObject({ state: "refused", code: "not-observable" });
    expect(computed(evidence.responses).records.every(({ loop }) => loop === "full-state")).toBe(true);
  });
});

describe("refusals", () => {
  test("a plant that cannot be stabilised is refused with the mode, everywhere the gain is needed", () => {
    const stuck = plantOf(
      [
        [1, 0],
        [0, -1],
      ],
      [[0], [1]],
      [[1, 0]],
    );
    const evidence = computeDesign(stuck, defaultRecipe(stuck));
    const refusal = { state: "refused", code: "not-stabilizable", data: { pole: { re: 1, im: 0 }, state: 0 } };
    for (const part of [evidence.gains, evidence.poles, evidence.reference, evidence.responses])
      expect(part).toMatchObject(refusal);
  });

  test("matrices that do not fit refuse every part and throw nothing", () => {
    const odd = { ...CARTS, B: [[1, 0]] };
    const evidence = computeDesign(odd, defaultRecipe(CARTS));
    for (const part of [evidence.gains, evidence.poles, evidence.reference, evidence.responses]) {
      expect(part).toMatchObject({ state: "refused", code: "shape-mismatch" });
    }
  });

  test("a recipe for another plant is refused, not misread", () => {
    const evidence = computeDesign(CARTS, defaultRecipe(DOUBLE_INTEGRATOR));
    expect(evidence.gains).toMatchObject({ state: "refused", code: "shape-mismatch" });
  });

  test("without feed-through there is no reference part and there are no steps", () => {
    const evidence = computeDesign(CARTS, { ...defaultRecipe(CARTS), reference: { kind: "none" } });
    expect(evidence.reference).toEqual({ state: "absent" });
    const { records, figures } = computed(evidence.responses);
    expect(records.map(({ kind }) => kind)).toEqual(["initial", "disturbance", "disturbance"]);
    expect(figures).toEqual([]);
  });
});

describe("evidence", () => {
  const sampledPlant = plantOf(
    [
      [1, 0.1],
      [0, 1],
    ],
    [[0.005], [0.1]],
    [[1, 0]],
    { kind: "sampled", period: 0.1 },
  );
  const cases: [string, PlantModel, Recipe][] = [
    ["continuous", CARTS, withObserver(CARTS, { kind: "poles", poles: real(-4, -5, -6, -7) })],
    ["sampled", sampledPlant, withObserver(sampledPlant, { kind: "reduced", poles: [{ kind: "time-constant", seconds: 0.05 }] })],
  ];

  test.each(cases)("of a %s plant is plain data of finite numbers, the same bits each time", (_, model, recipe) => {
    const first = computeDesign(model, recipe);
    for (const part of [first.gains, first.poles, first.reference, first.observer, first.responses])
      expect(part.state).toBe("computed");
    expect(structuredClone(first)).toEqual(first);
    expect(numbersIn(first).every(Number.isFinite)).toBe(true);
    expect(computeDesign(structuredClone(model), structuredClone(recipe))).toEqual(first);
  });

  test("of a sampled plant keeps the plant's own instants", () => {
    const { records } = computed(computeDesign(sampledPlant, defaultRecipe(sampledPlant)).responses);
    for (const { step } of records) expect(step / 0.1).toBe(Math.round(step / 0.1));
  });
});

function numbersIn(value: unknown): number[] {
  if (typeof value === "number") return [value];
  if (value instanceof Float64Array) return Array.from(value);
  if (typeof value === "object" && value !== null) return Object.values(value).flatMap(numbersIn);
  return [];
}

test("the type of the evidence names every part", () => {
  const parts: (keyof Evidence)[] = ["methodVersion", "gains", "poles", "reference", "observer", "responses"];
  expect(Object.keys(computeDesign(CARTS, defaultRecipe(CARTS))).sort()).toEqual([...parts].sort());
});
