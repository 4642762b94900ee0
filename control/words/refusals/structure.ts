import type { PlantModel } from "../../plant/model";
import { formatNumber } from "../format-number";
import { joinNames } from "../join-names";
import { modeOf, numberOf } from "./facts";
import type { Explainers, Facts } from "./types";

function distance(data: Facts): string {
  const value = numberOf(data, "distance");
  return value === null ? "" : ` (distance ${formatNumber(value, 2)} of the scaled model)`;
}

function names(signals: PlantModel["inputs"] | PlantModel["outputs"]): string {
  return signals.length > 4 ? `the ${signals.length}` : joinNames(signals.map(({ name }) => name));
}

/** Refusals about what inputs reach and outputs see. */
export const explainStructure: Pick<
  Explainers,
  "not-stabilizable" | "not-detectable" | "not-controllable" | "not-observable" | "unweighted-boundary-mode"
> = {
  "not-stabilizable": (data, model) => ({
    title: "Cannot be stabilised",
    sentence: `No input moves ${modeOf(data, model)}, and it does not decay by itself${distance(data)}: no gain on ${names(model.inputs)} can hold it.`,
    nextStep: "Add an input that acts on this state, or check its row in A and B for a missing entry.",
  }),
  "not-detectable": (data, model) => ({
    title: "Cannot be estimated",
    sentence: `No output shows ${modeOf(data, model)}, and it does not decay by itself${distance(data)}: an estimate from ${names(model.outputs)} would drift away from it.`,
    nextStep: "Add a sensor that sees this state, or check its column in A and C for a missing entry.",
  }),
  "not-controllable": (data, model) => ({
    title: "A pole cannot be moved",
    sentence: `No input moves ${modeOf(data, model)}${distance(data)}: it stays where it is under every gain.`,
    nextStep: "Design by weights instead, which leaves this mode as it is, or add an input that acts on the state.",
  }),
  "not-observable": (data, model) => ({
    title: "A pole of the observer cannot be moved",
    sentence: `No output shows ${modeOf(data, model)}${distance(data)}: the estimation error keeps this pole under every observer gain.`,
    nextStep: "Choose the observer by noise instead, which leaves this mode as it is, or add a sensor that sees the state.",
  }),
  "unweighted-boundary-mode": (data, model) => ({
    title: "The weights overlook a mode",
    sentence: `The weights put no price on ${modeOf(data, model)}, which stands on the stability boundary: the cheapest control leaves it there.`,
    nextStep: "Give a state that takes part in this mode a weight, however small, or ask for a degree of stability.",
  }),
};
