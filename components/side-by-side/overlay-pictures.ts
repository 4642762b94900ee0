import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import type { StepFiguresReply } from "../designs/evidence/figures-reply";
import { percentText } from "../designs/percent-text";
import type { OverlayTrace } from "../plots/overlay-data";
import { mergeOrder } from "./compared-rows";

export type CommandedSignal = { readonly name: string; readonly unit: string; readonly amplitude: number };

/** What the overlay needs to know of a design beside its curves. */
export type OverlaidDesign = {
  readonly id: string;
  readonly label: string;
  /** Place among the designs as chosen: it decides the dash, which stays when they are put in another order. */
  readonly place: number;
  readonly commanded: readonly CommandedSignal[];
  readonly figures: readonly StepFiguresReply[];
  readonly hasObserver: boolean;
  /** Inputs are held between samples. */
  readonly sampled: boolean;
};

export type Loop = ResponseCurves["loop"];
type Signal = ResponseCurves["signals"][number];

export type OverlayPicture = {
  readonly key: string;
  readonly name: string;
  readonly unit: string;
  readonly effort: boolean;
  readonly traces: readonly OverlayTrace[];
  readonly summary: readonly string[];
};

/** Quantities that can be commanded on any of the designs, matched by name. */
export const commandedNames = (designs: readonly OverlaidDesign[]): string[] =>
  mergeOrder(designs.map(({ commanded }) => commanded.map(({ name }) => name)));

export const sourceOf = ({ commanded }: OverlaidDesign, name: string): number =>
  commanded.findIndex((signal) => signal.name === name);

/** The loop of a design as it is to be looked at: one without an observer only has the full state. */
export const loopOf = ({ hasObserver }: OverlaidDesign, wanted: Loop): Loop => (hasObserver ? wanted : "full-state");

/** "y commanded 10 mm"; where the tests differ each design says its own. */
export function commandText(designs: readonly OverlaidDesign[], name: string): string {
  const steps = designs.flatMap(({ commanded }) => commanded.filter((signal) => signal.name === name));
  const sizes = [...new Set(steps.map(({ amplitude, unit }) => `${formatNumber(amplitude)} ${unit}`))];
  return `${name} commanded ${sizes.join(" or ")}`;
}

function sentence(design: OverlaidDesign, { role, index, name, unit }: Signal, curve: ResponseCurves): string | null {
  const step = design.figures.find(({ loop, source }) => loop === curve.loop && source === curve.source);
  if (!step) return null;
  const at = (seconds: number | null) => (seconds === null ? "" : ` at ${formatSeconds(seconds)}`);
  if (role === "input") {
    const { peak, at: when, overLimit } = step.effort[index];
    const share = overLimit === null ? "" : `, ${percentText(100 * overLimit)} of its limit`;
    return `${design.label}: ${name} peaks at ${formatNumber(peak)} ${unit}${at(when)}${share}.`;
  }
  const figures = (role === "commanded" ? step.commanded : step.outputs)[index];
  const parts = [`largest deviation ${formatNumber(figures.peak)} ${unit}${at(figures.peakAt)}`];
  if (role === "commanded" && index === curve.source) {
    if (figures.settling !== null) parts.push(`settled after ${formatSeconds(figures.settling)}`);
    if (figures.overshoot !== null) parts.push(`overshoot ${percentText(figures.overshoot)}`);
  }
  return `${design.label}: ${parts.join(", ")}.`;
}

type Overlaid = { readonly design: OverlaidDesign; readonly curve: ResponseCurves };

/** Measured quantities that are commanded too are drawn once, as commanded. */
function wantedSignals({ signals }: ResponseCurves): Signal[] {
  const commanded = new Set(signals.filter(({ role }) => role === "commanded").map(({ name }) => name));
  return signals.filter(({ role, name }) => role !== "output" || !commanded.has(name));
}

const keyOf = ({ role, name, unit }: Signal) => `${role} ${name} ${unit}`;

/** One picture per quantity and input, every design's curve in it. `curves[k]` belongs to `designs[k]`; null where there is none. */
export function overlayPictures(
  designs: readonly OverlaidDesign[],
  curves: readonly (ResponseCurves | null)[],
): OverlayPicture[] {
  const drawn = designs.flatMap((design, index): Overlaid[] => {
    const curve = curves[index];
    return curve ? [{ design, curve }] : [];
  });
  const keys = mergeOrder(drawn.map(({ curve }) => wantedSignals(curve).map(keyOf)));
  return keys.map((key) => {
    const found = drawn.flatMap(({ design, curve }) => {
      const row = curve.signals.findIndex((signal) => keyOf(signal) === key);
      return row < 0 ? [] : [{ design, curve, signal: curve.signals[row], values: curve.values[row] }];
    });
    const { name, unit, role, axis } = found[0].signal;
    const traces = found.map(({ design, curve, values }) => ({
      key: design.id,
      name: design.label,
      values,
      step: curve.step,
      // The hue is the first design's, so that one quantity has one hue.
      axis,
      design: design.place,
      held: role === "input" && design.sampled,
    }));
    const summary = found.flatMap(({ design, signal, curve }) => sentence(design, signal, curve) ?? []);
    return { key, name, unit, effort: role === "input", traces, summary };
  });
}
