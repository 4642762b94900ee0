import type { PlantModel } from "../../plant/model";
import { formatComplex } from "../format-complex";
import { formatNumber } from "../format-number";
import { joinNames } from "../join-names";
import { numberOf, ofObserver, poleOf } from "./facts";
import type { Explainers, Facts, RefusalWords } from "./types";

function pole(data: Facts): string {
  const value = poleOf(data);
  return value === null ? "A wanted pole" : `The wanted pole ${formatComplex(value, { pair: false })}`;
}

function entry(data: Facts): string {
  const index = numberOf(data, "index");
  return index === null ? "" : ` (entry ${index + 1})`;
}

function boundary(model: PlantModel): string {
  return model.timeBase.kind === "sampled" ? "inside the unit circle" : "left of the imaginary axis";
}

function poleMultiplicity(data: Facts, model: PlantModel): RefusalWords {
  const multiplicity = numberOf(data, "multiplicity");
  const rank = numberOf(data, "rank");
  const signals = ofObserver(data) ? model.outputs : model.inputs;
  const one = ofObserver(data) ? "output" : "input";
  const names = signals.length > 4 ? `the ${signals.length} ${one}s` : joinNames(signals.map(({ name }) => name));
  const allowed =
    rank === null
      ? `${names} allow fewer`
      : `${names}, ${rank} independent ${rank === 1 ? one : `${one}s`}, ${signals.length === 1 ? "allows" : "allow"} it ${rank === 1 ? "once" : `${rank} times`}`;
  return {
    title: "A pole is repeated too often",
    sentence: `${pole(data)} is asked for ${multiplicity === null ? "more" : multiplicity} times, but ${allowed} without losing the robustness of ${
      ofObserver(data) ? "the observer" : "the loop"
    }.`,
    nextStep:
      "Spread the repeated poles apart by a few percent, or allow dependent eigenvectors and accept poles that small errors move far.",
  };
}

function tooSensitive(data: Facts): RefusalWords {
  const error = numberOf(data, "poleError");
  const limit = numberOf(data, "limit");
  const share = (value: number) => `${formatNumber(100 * value, 2)} %`;
  const found = error === null || error > 1 ? "by more than its own size" : `by ${share(error)} of its size`;
  const one = ofObserver(data) ? "sensor" : "input";
  return {
    title: "The wanted poles are too sensitive",
    sentence: `${pole(data)} cannot be held: even with every digit a computer keeps, rounding the gain moves it ${found}${
      limit === null ? "" : `, where ${share(limit)} is allowed`
    }, so the gain is not shown.`,
    nextStep: `Ask for poles nearer to the plant's own, spread poles that lie close together, or use another ${one}.`,
  };
}

/** Refusals about wanted poles. */
export const explainPoles: Pick<
  Explainers,
  "pole-count" | "poles-not-conjugate" | "pole-multiplicity" | "too-sensitive" | "unstable-pole"
> = {
  "pole-count": (data, model) => {
    const expected = numberOf(data, "expected") ?? model.states.length;
    const given = numberOf(data, "given");
    return {
      title: given !== null && given > expected ? "Too many poles" : "Poles missing",
      sentence: `This needs ${expected} poles${given === null ? "" : `, and ${given} ${given === 1 ? "is" : "are"} given`}; a pair counts as two.`,
      nextStep: given !== null && given > expected ? `Take ${given - expected} away.` : `Add poles until there are ${expected}.`,
    };
  },
  "poles-not-conjugate": (data) => ({
    title: "A complex pole stands alone",
    sentence: `${pole(data)}${entry(data)} has no mirror image about the real axis, and a real gain can only place both.`,
    nextStep: "Enter it as a pair.",
  }),
  "pole-multiplicity": poleMultiplicity,
  "too-sensitive": tooSensitive,
  "unstable-pole": (data, model) => ({
    title: "A wanted pole is not stable",
    sentence: `${pole(data)}${entry(data)} does not lie ${boundary(model)}: ${ofObserver(data) ? "the estimate" : "the loop"} would not come to rest.`,
    nextStep: `Choose a pole ${boundary(model)}.`,
  }),
};
