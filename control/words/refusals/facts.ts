import type { Complex, PlantModel } from "../../plant/model";
import { describePole } from "../describe-mode";
import { formatComplex } from "../format-complex";
import type { Facts } from "./types";

/** A fact as a finite number, or null: facts come from stored documents too and may be anything. */
export function numberOf(data: Facts, name: string): number | null {
  const value = data[name];
  return typeof value === "number" && Number.isFinite(value) ? value : null;
}

export function textOf(data: Facts, name: string): string | null {
  const value = data[name];
  return typeof value === "string" && value !== "" ? value.slice(0, 200) : null;
}

export function poleOf(data: Facts): Complex | null {
  const value = data.pole;
  if (typeof value !== "object" || value === null || !("re" in value) || !("im" in value)) return null;
  const { re, im } = value;
  if (typeof re !== "number" || typeof im !== "number" || !Number.isFinite(re) || !Number.isFinite(im)) return null;
  return { re, im };
}

/** Whether an observer was refused and not the regulator. */
export const ofObserver = (data: Facts): boolean => data.of === "observer";

/** "3 × 2" of a pair of sizes. */
export function sizeOf(data: Facts, name: string): string | null {
  const value = data[name];
  if (typeof value === "number" && Number.isFinite(value)) return String(value);
  return Array.isArray(value) && value.length > 0 && value.every(Number.isInteger) ? value.join(" × ") : null;
}

/** Name of signal number `index` of a list, or of its place when there is none. */
export function signalName(signals: readonly { readonly name: string }[], index: number | null, kind: string): string | null {
  if (index === null) return null;
  return signals[index]?.name ?? `${kind} ${index + 1}`;
}

/** "the oscillation at 15.8 Hz (pole −0.91 ± 99.03 i), mostly th", as far as the facts go. */
export function modeOf(data: Facts, model: PlantModel): string {
  const pole = poleOf(data);
  const state = signalName(model.states, numberOf(data, "state"), "state");
  const mainly = state === null ? "" : `, mostly ${state}`;
  if (pole === null) return state === null ? "one mode" : `the mode of ${state}`;
  return `the ${describePole(pole, model.timeBase)} (pole ${formatComplex(pole)})${mainly}`;
}

export function startSentence(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
