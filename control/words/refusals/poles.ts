import type { PlantModel } from "../../plant/model";
import { formatComplex } from "../format-complex";
import { numberOf, poleOf } from "./facts";
import type { Explainers, Facts } from "./types";

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

/** Refusals about wanted poles. */
export const explainPoles: Pick<Explainers, "pole-count" | "poles-not-conjugate" | "pole-multiplicity" | "unstable-pole"> = {
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
  "pole-multiplicity": (data) => {
    const multiplicity = numberOf(data, "multiplicity");
    const rank = numberOf(data, "rank");
    return {
      title: "A pole is repeated too often",
      sentence: `${pole(data)} is asked for ${multiplicity === null ? "more" : multiplicity} times, but ${
        rank === null
          ? "the inputs allow fewer"
          : `${rank} independent ${rank === 1 ? "input allows" : "inputs allow"} it ${rank === 1 ? "once" : `${rank} times`}`
      } without losing the loop's robustness.`,
      nextStep: "Spread the repeated poles apart by a few percent.",
    };
  },
  "unstable-pole": (data, model) => ({
    title: "A wanted pole is not stable",
    sentence: `${pole(data)}${entry(data)} does not lie ${boundary(model)}: the loop would not come to rest.`,
    nextStep: `Choose a pole ${boundary(model)}.`,
  }),
};
