import { switchAccelerator } from "../../control/accelerator/accelerator";
import { computeDesign } from "../../control/design/compute-design";
import { defaultRecipe } from "../../control/design/default-recipe";
import type { ObserverRecipe, PoleEntry, Recipe } from "../../control/design/recipe";
import type { PlantModel } from "../../control/plant/model";
import { seededUniform } from "./seeded";

/** Whether the accelerator was in use, and for each design what each part of its evidence hashes to. */
export type DesignBits = { readonly accelerated: boolean; readonly designs: readonly Readonly<Record<string, string>>[] };

/** Coupled plants of 2 to 17 states, continuous and sampled, by weights and by poles, with every kind of observer. */
export function bitsOfDesigns(count: number, accelerated: boolean): DesignBits {
  const inUse = switchAccelerator(accelerated);
  const designs = Array.from({ length: count }, (_, i) => {
    const { model, recipe } = seededDesign(1000 + i);
    const { methodVersion, ...parts } = computeDesign(model, recipe);
    return Object.fromEntries(Object.entries(parts).map(([name, part]) => [name, `${part.state} ${hashOfBits(part)}`]));
  });
  switchAccelerator(true);
  return { accelerated: inUse, designs };
}

function seededDesign(seed: number): { model: PlantModel; recipe: Recipe } {
  const random = seededUniform(seed);
  const whole = (low: number, high: number) => low + Math.floor(random() * (high - low + 1));
  const n = seed % 25 === 0 ? 17 : whole(2, 6);
  const [m, p] = [whole(1, 2), whole(1, 2)];
  const sampled = random() < 0.3;
  // Units of unlike size, so that scaling has something to do.
  const units = Array.from({ length: n }, () => 4 ** whole(-6, 6));
  const rows = (height: number, width: number, entry: (i: number, j: number) => number) =>
    Array.from({ length: height }, (_, i) => Array.from({ length: width }, (__, j) => entry(i, j)));
  const signals = (length: number) => Array.from({ length }, (_, i) => ({ name: `s${i}`, unit: "1", axis: null, scale: null }));
  const size = sampled ? 0.9 / Math.sqrt(n) : 4;
  const C = rows(p, n, (_, j) => (2 * random() - 1) / units[j]);
  const model: PlantModel = {
    timeBase: sampled ? { kind: "sampled", period: 0.01 } : { kind: "continuous" },
    axes: [],
    states: signals(n),
    inputs: signals(m).map((input) => ({ ...input, lower: -10, upper: 10 })),
    outputs: signals(p),
    disturbances: [],
    commanded: signals(Math.min(m, p)).map(({ name, unit, axis }) => ({ name, unit, axis, amplitude: 1 })),
    A: rows(n, n, (i, j) => ((2 * random() - 1) * size * units[i]) / units[j]),
    B: rows(n, m, (i) => (2 * random() - 1) * units[i]),
    C,
    D: rows(p, m, () => 0),
    E: rows(n, 0, () => 0),
    H: C.slice(0, Math.min(m, p)),
    J: rows(Math.min(m, p), m, () => 0),
    operatingPoint: { states: Array(n).fill(0), inputs: Array(m).fill(0), outputs: Array(p).fill(0) },
  };
  return { model, recipe: seededRecipe(model, random, seed) };
}

function seededRecipe(model: PlantModel, random: () => number, seed: number): Recipe {
  const [n, p] = [model.states.length, model.outputs.length];
  const poles = (count: number): PoleEntry[] =>
    Array.from({ length: count }, (_, i) => ({
      kind: "real",
      value: model.timeBase.kind === "sampled" ? 0.1 + (0.8 * (i + random())) / count : -1 - i - random(),
    }));
  const diagonal = (count: number, value: number) =>
    Array.from({ length: count }, (_, i) => Array.from({ length: count }, (__, j) => (i === j ? value : 0)));
  const observers: ObserverRecipe[] = [
    { kind: "none" },
    { kind: "poles", poles: poles(n) },
    { kind: "noise", process: diagonal(n, 1), measurement: diagonal(p, 0.1) },
    { kind: "reduced", poles: poles(n - p) },
  ];
  const { version, reference, test, reasons, ...weights } = defaultRecipe(model);
  const base = { version, reference, test, reasons, observer: observers[seed % 4] };
  return seed % 3 === 0 ? { ...base, method: "poles", poles: poles(n) } : { ...weights, ...base };
}

/** FNV-1a over the bit patterns of all numbers in order of their keys, with texts and shapes; zeros keep their sign. */
function hashOfBits(value: unknown): string {
  const view = new DataView(new ArrayBuffer(8));
  let hash = 0x811c9dc5;
  const take = (word: number) => {
    for (let shift = 0; shift < 32; shift += 8) hash = Math.imul(hash ^ ((word >>> shift) & 255), 0x01000193);
  };
  const visit = (part: unknown): void => {
    if (typeof part === "number") {
      view.setFloat64(0, part);
      take(view.getUint32(0));
      take(view.getUint32(4));
    } else if (part instanceof Float64Array) part.forEach(visit);
    else if (typeof part === "object" && part !== null) {
      for (const [key, inner] of Object.entries(part)) {
        for (let i = 0; i < key.length; i++) take(key.charCodeAt(i));
        visit(inner);
      }
    } else for (const letter of String(part)) take(letter.charCodeAt(0));
  };
  visit(value);
  return (hash >>> 0).toString(16).padStart(8, "0");
}
