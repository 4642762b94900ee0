import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import { computed } from "../designs/evidence/figures-reply";
import type { OverlayTrace } from "../plots/overlay-data";
import type { Compared } from "./compare-types";
import { unionByName } from "./difference-marks";

export type Quantity = {
  readonly name: string;
  readonly unit: string;
  readonly axis: number | null;
  readonly role: "commanded" | "input";
};

/** What is drawn after a step: every commanded quantity, then every input, each name once. */
export function quantitiesOf(designs: readonly Compared[]): Quantity[] {
  const of = (role: Quantity["role"], lists: Parameters<typeof unionByName<Omit<Quantity, "role">>>[0]) =>
    unionByName(lists).map(({ name, unit, axis }) => ({ name, unit, axis, role }));
  return [
    ...of(
      "commanded",
      designs.map(({ model }) => model.commanded),
    ),
    ...of(
      "input",
      designs.map(({ model }) => model.inputs),
    ),
  ];
}

/** The loop that will run: with the observer where there is one. */
export const loopOf = ({ evidence }: Compared): ResponseCurves["loop"] =>
  computed(evidence.responses)?.summary.observer ? "observer" : "full-state";

export const sourceOf = ({ model }: Compared, commanded: string) => model.commanded.findIndex(({ name }) => name === commanded);

/** One curve per design that has the quantity and the command; hue by axis, dash by design. */
export function tracesOf(
  designs: readonly Compared[],
  curves: readonly (ResponseCurves | undefined)[],
  quantity: Quantity,
): OverlayTrace[] {
  return designs.flatMap((design, place) => {
    const curve = curves[place];
    const row = curve?.signals.findIndex(({ role, name }) => role === quantity.role && name === quantity.name) ?? -1;
    if (!curve || row < 0) return [];
    const held = quantity.role === "input" && design.model.timeBase.kind === "sampled";
    const trace = {
      key: design.id,
      name: design.designName,
      values: curve.values[row],
      step: curve.step,
      axis: quantity.axis,
      design: place,
    };
    return [held ? { ...trace, held } : trace];
  });
}

function sentenceOf(design: Compared, commanded: string, { role, name, unit }: Quantity): string[] {
  const source = sourceOf(design, commanded);
  const figures = computed(design.evidence.responses)?.figures.find(
    (step) => step.loop === loopOf(design) && step.source === source,
  );
  if (!figures) return [];
  if (role === "input") {
    const effort = figures.effort[design.model.inputs.findIndex((input) => input.name === name)];
    if (!effort) return [];
    const limit = effort.overLimit === null ? "" : effort.overLimit > 1 ? ", beyond its limit" : ", within its limit";
    return [`${design.designName}: at most ${formatNumber(effort.peak)} ${unit}${limit}.`];
  }
  const signal = figures.commanded[design.model.commanded.findIndex((one) => one.name === name)];
  if (!signal) return [];
  const settled = signal.settling === null ? "" : `, settled after ${formatSeconds(signal.settling)}`;
  return [
    `${design.designName}: peak ${formatNumber(signal.peak)} ${unit}, ${formatNumber(signal.final)} ${unit} at rest${settled}.`,
  ];
}

/** What the curves show, a sentence per design. */
export const sentencesOf = (designs: readonly Compared[], commanded: string, quantity: Quantity): string[] =>
  designs.flatMap((design) => sentenceOf(design, commanded, quantity));

/** "y commanded 0.5 mm", or the sizes where they are not the same. */
export function commandText(designs: readonly Compared[], commanded: string): string {
  const sizes = new Set(
    designs.flatMap(({ model }) =>
      model.commanded.filter(({ name }) => name === commanded).map(({ amplitude, unit }) => `${formatNumber(amplitude)} ${unit}`),
    ),
  );
  return `${commanded} commanded ${[...sizes].join(" or ")}`;
}
