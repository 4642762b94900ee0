import fc from "fast-check";
import { expect, test } from "vitest";
import { computeDesign } from "@/control/design/compute-design";
import { defaultRecipe } from "@/control/design/default-recipe";
import type { Evidence } from "@/control/design/evidence";
import type { ObserverRecipe, PoleEntry, Recipe } from "@/control/design/recipe";
import { eigenvalues } from "@/control/linalg/eigenvalues";
import type { PlantModel } from "@/control/plant/model";
import { toMatrix } from "@/control/plant/to-matrix";
import { seededUniform } from "../helpers/seeded";

/** Kinds of entries: sparse signs, ordinary, units spread over 2^±40, huge and tiny, a mix of sizes. */
const ENTRIES: readonly ((random: () => number) => number)[] = [
  (random) => [-1, 0, 0, 0, 1][Math.floor(5 * random())],
  (random) => 2 * random() - 1,
  (random) => (2 * random() - 1) * 2 ** Math.floor(80 * random() - 40),
  (random) => (random() < 0.5 ? 0 : (2 * random() - 1) * 10 ** Math.floor(300 * random() - 150)),
  (random) => [0, 0, 1, -1, 1e-8, -3, 1e6][Math.floor(7 * random())],
];

function hostileDesign(seed: number): { model: PlantModel; recipe: Recipe } {
  const random = seededUniform(seed);
  const whole = (low: number, high: number) => low + Math.floor(random() * (high - low + 1));
  const entry = ENTRIES[whole(0, ENTRIES.length - 1)];
  const [n, m, p, q] = [whole(1, 6), whole(1, 3), whole(0, 3), whole(0, 2)];
  const sampled = random() < 0.4;
  const rows = (height: number, width: number) =>
    Array.from({ length: height }, () => Array.from({ length: width }, () => entry(random)));
  const signals = (count: number) =>
    Array.from({ length: count }, (_, i) => ({
      name: `s${i}`,
      unit: "1",
      axis: null,
      scale: random() < 0.5 ? null : 10 ** whole(-3, 3),
    }));
  const model: PlantModel = {
    timeBase: sampled ? { kind: "sampled", period: 10 ** whole(-3, 0) } : { kind: "continuous" },
    axes: [],
    states: signals(n),
    inputs: signals(m).map((input) => ({ ...input, lower: -1, upper: null })),
    outputs: signals(p),
    disturbances: [],
    commanded: signals(q).map(({ name, unit, axis }) => ({ name, unit, axis, amplitude: 1 })),
    A: rows(n, n),
    B: rows(n, m),
    C: rows(p, n),
    D: rows(p, m),
    E: rows(n, 0),
    H: rows(q, n),
    J: rows(q, m),
    operatingPoint: { states: Array(n).fill(0), inputs: Array(m).fill(0), outputs: Array(p).fill(0) },
  };
  const poles = (count: number): PoleEntry[] =>
    Array.from({ length: count }, () => ({ kind: "real", value: sampled ? 0.9 * random() : -10 * random() }));
  const diagonal = (count: number, value: number) =>
    Array.from({ length: count }, (_, i) => Array.from({ length: count }, (__, j) => (i === j ? value : 0)));
  const observers: ObserverRecipe[] = [
    { kind: "none" },
    { kind: "poles", poles: poles(n) },
    { kind: "noise", process: diagonal(n, 1), measurement: diagonal(p, 0.1) },
    { kind: "reduced", poles: poles(Math.max(0, n - p)) },
  ];
  const { version, reference, test: shown, reasons, ...weights } = defaultRecipe(model);
  const base = { version, reference, test: shown, reasons, observer: observers[whole(0, 3)] };
  return { model, recipe: random() < 0.4 ? { ...base, method: "poles", poles: poles(n) } : { ...weights, ...base } };
}

function strayNumber(value: unknown, path: string): string | null {
  if (typeof value === "number") return Number.isFinite(value) ? null : path;
  if (value instanceof Float64Array) return value.every(Number.isFinite) ? null : path;
  if (typeof value !== "object" || value === null) return null;
  return Object.entries(value).reduce<string | null>(
    (found, [key, inner]) => found ?? strayNumber(inner, `${path}/${key}`),
    null,
  );
}

/** Largest distance outside the stability boundary of the poles of A - B K, or -1 when there is no gain. */
function instability({ gains }: Evidence, { A, B, timeBase, states, inputs }: PlantModel): number {
  if (gains.state !== "computed") return -1;
  const [n, m] = [states.length, inputs.length];
  const closed = toMatrix("A", A, n, n).sub(toMatrix("B", B, n, m).mmul(toMatrix("K", gains.value.K, m, n)));
  return Math.max(...eigenvalues(closed).map(({ re, im }) => (timeBase.kind === "sampled" ? Math.hypot(re, im) - 1 : re)));
}

test("whatever plant and recipe come, each part is finite numbers or a typed refusal, and no gain leaves a loop unstable", () => {
  fc.assert(
    fc.property(fc.integer({ min: 1, max: 2 ** 31 - 1 }), (seed) => {
      const { model, recipe } = hostileDesign(seed);
      const evidence = computeDesign(model, recipe);
      for (const part of [evidence.gains, evidence.poles, evidence.reference, evidence.observer, evidence.responses]) {
        if (part.state === "computed") expect(strayNumber(part.value, "")).toBeNull();
        if (part.state === "refused") expect(part.code).toMatch(/^[a-z-]+$/);
      }
      expect(instability(evidence, model)).toBeLessThan(0);
    }),
    { numRuns: 200 },
  );
}, 60_000);
