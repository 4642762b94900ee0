import { commandedOf, matricesOf } from "@/control/plant/content-shape";
import type { PlantContent } from "@/lib/schemas/plant";

/** The lists of signals that give the matrices their shape. */
export const SIGNAL_LISTS = ["states", "inputs", "outputs", "disturbances", "commanded"] as const;
export type SignalList = (typeof SIGNAL_LISTS)[number];
type Entries = string[][];
/** Where each place of a new list came from: an old index, or null for a new signal. */
type Origins = readonly (number | null)[];

function remapped(entries: Entries, rows: Origins, columns: Origins): Entries {
  return rows.map((r) => columns.map((c) => (r === null || c === null ? "0" : (entries[r]?.[c] ?? "0"))));
}

const same = (length: number): Origins => Array.from({ length }, (_, index) => index);

/** Rows and columns of every matrix follow its signals; what a new signal has not been given yet is zero. */
function reshaped(content: PlantContent, list: SignalList, origins: Origins): PlantContent {
  const along = (name: SignalList, length: number) => (name === list ? origins : same(length));
  const n = along("states", content.states.length);
  const m = along("inputs", content.inputs.length);
  const p = along("outputs", content.outputs.length);
  const w = along("disturbances", content.disturbances.length);
  const q = along("commanded", content.commanded?.length ?? 0);
  const at = content.operatingPoint;
  const values = (given: readonly number[], from: Origins) => from.map((index) => (index === null ? 0 : (given[index] ?? 0)));
  return {
    ...content,
    A: remapped(content.A, n, n),
    B: remapped(content.B, n, m),
    C: remapped(content.C, p, n),
    D: content.D && remapped(content.D, p, m),
    E: content.E && remapped(content.E, n, w),
    H: content.H && remapped(content.H, q, n),
    J: content.J && remapped(content.J, q, m),
    operatingPoint: at && { states: values(at.states, n), inputs: values(at.inputs, m), outputs: values(at.outputs, p) },
  };
}

type Signals = { [L in SignalList]: NonNullable<PlantContent[L]> };

/** Puts `signals` in place of a list; `origins` says which rows and columns go with them. */
export function withSignals<L extends SignalList>(
  content: PlantContent,
  list: L,
  signals: Signals[L],
  origins: Origins,
): PlantContent {
  return { ...reshaped(content, list, origins), [list]: signals };
}

export const BLANK_SIGNAL: { readonly [L in SignalList]: Signals[L][number] } = {
  states: { name: "", unit: "", axis: null, scale: null },
  inputs: { name: "", unit: "", axis: null, scale: null, lower: null, upper: null },
  outputs: { name: "", unit: "", axis: null, scale: null },
  disturbances: { name: "", unit: "", axis: null, scale: null },
  commanded: { name: "", unit: "", axis: null, amplitude: 1 },
};
const LETTER: Record<SignalList, string> = { states: "x", inputs: "u", outputs: "y", disturbances: "w", commanded: "z" };

/** A name that is free, so that adding a signal never makes a duplicate. */
export function freeName(list: SignalList, taken: readonly { readonly name: string }[]): string {
  for (let number = taken.length + 1; ; number++) {
    const name = `${LETTER[list]}${number}`;
    if (!taken.some((signal) => signal.name === name)) return name;
  }
}

export function addSignal(content: PlantContent, list: SignalList): PlantContent {
  const signals = content[list] ?? [];
  const added = { ...BLANK_SIGNAL[list], name: freeName(list, signals) };
  const grown =
    list === "disturbances" && content.E === null ? { ...content, E: content.states.map((): string[] => []) } : content;
  return withSignals(grown, list, [...signals, added] as never, [...same(signals.length), null]);
}

export function removeSignal(content: PlantContent, list: SignalList, index: number): PlantContent {
  const kept = same((content[list] ?? []).length).filter((place) => place !== index) as number[];
  return withSignals(content, list, kept.map((place) => (content[list] ?? [])[place]) as never, kept);
}

/** Rows and columns move with the signal. */
export function moveSignal(content: PlantContent, list: SignalList, index: number, by: -1 | 1): PlantContent {
  const order = same((content[list] ?? []).length) as number[];
  const target = index + by;
  if (target < 0 || target >= order.length) return content;
  [order[index], order[target]] = [order[target], order[index]];
  return withSignals(content, list, order.map((place) => (content[list] ?? [])[place]) as never, order);
}

export function changeSignal(
  content: PlantContent,
  list: SignalList,
  index: number,
  change: Readonly<Record<string, unknown>>,
): PlantContent {
  const signals = (content[list] ?? []).map((signal, place) => (place === index ? { ...signal, ...change } : signal));
  return { ...content, [list]: signals };
}

/** Signals of an axis that is removed belong to none; later axes move up by one. */
export function removeAxis(content: PlantContent, axis: number): PlantContent {
  const follow = <S extends { readonly axis: number | null }>(signal: S): S => {
    if (signal.axis === null || signal.axis < axis) return signal;
    return { ...signal, axis: signal.axis === axis ? null : signal.axis - 1 };
  };
  return {
    ...content,
    axes: content.axes.filter((_, index) => index !== axis),
    states: content.states.map(follow),
    inputs: content.inputs.map(follow),
    outputs: content.outputs.map(follow),
    disturbances: content.disturbances.map(follow),
    commanded: content.commanded?.map(follow) ?? null,
  };
}

/** A list of commanded quantities of its own starts as a copy of the outputs. */
export function ownCommanded(content: PlantContent): PlantContent {
  const { H, J } = matricesOf(content);
  const copy = (entries: readonly (readonly string[])[]) => entries.map((row) => [...row]);
  return { ...content, commanded: [...commandedOf(content)], H: copy(H.entries), J: copy(J.entries) };
}

export const outputsCommanded = (content: PlantContent): PlantContent => ({ ...content, commanded: null, H: null, J: null });

/** The operating point appears with its first value; all others are zero. */
export function withOperatingValue(
  content: PlantContent,
  list: "states" | "inputs" | "outputs",
  index: number,
  value: number,
): PlantContent {
  const rest = (signals: readonly unknown[]) => signals.map(() => 0);
  const { states, inputs, outputs } = content;
  const at = content.operatingPoint ?? { states: rest(states), inputs: rest(inputs), outputs: rest(outputs) };
  return { ...content, operatingPoint: { ...at, [list]: at[list].map((old, place) => (place === index ? value : old)) } };
}

/** A plant of so many axes, each a position and a rate driven by one input and read by one output: a shape to type into. */
export function blankPlant(axisNames: readonly string[]): PlantContent {
  const count = axisNames.length;
  const per = <T>(make: (axis: number) => T) => axisNames.map((_, axis) => make(axis));
  const zeros = (rows: number, columns: number): Entries =>
    Array.from({ length: rows }, () => new Array<string>(columns).fill("0"));
  const A = zeros(2 * count, 2 * count);
  const B = zeros(2 * count, count);
  const C = zeros(count, 2 * count);
  for (let axis = 0; axis < count; axis++) {
    A[axis][count + axis] = "1";
    B[count + axis][axis] = "1";
    C[axis][axis] = "1";
  }
  const signal = (name: string, unit: string, axis: number) => ({ name, unit, axis, scale: null });
  return {
    version: 1,
    timeBase: { kind: "continuous" },
    axes: axisNames.map((name, index) => ({ name, tag: String(index + 1) })),
    parameters: [],
    states: [...per((axis) => signal(`x${axis + 1}`, "m", axis)), ...per((axis) => signal(`v${axis + 1}`, "m/s", axis))],
    inputs: per((axis) => ({ ...signal(`F${axis + 1}`, "N", axis), lower: null, upper: null })),
    outputs: per((axis) => signal(`y${axis + 1}`, "m", axis)),
    disturbances: [],
    commanded: null,
    ...{ A, B, C, D: null, E: null, H: null, J: null },
    operatingPoint: null,
    source: "",
  };
}
