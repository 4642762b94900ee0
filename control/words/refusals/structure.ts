import type { PlantModel } from "../../plant/model";
import { stabilityMargin } from "../../structure/continuous-pole";
import { formatNumber } from "../format-number";
import { joinNames } from "../join-names";
import { modeOf, numberOf, ofObserver, poleOf } from "./facts";
import type { Explainers, Facts, RefusalWords } from "./types";

function distance(data: Facts): string {
  const value = numberOf(data, "distance");
  return value === null ? "" : ` (distance ${formatNumber(value, 2)} of the scaled model)`;
}

function names(signals: PlantModel["inputs"] | PlantModel["outputs"]): string {
  return signals.length > 4 ? `the ${signals.length}` : joinNames(signals.map(({ name }) => name));
}

function decays(data: Facts, { timeBase }: PlantModel): boolean {
  const pole = poleOf(data);
  return pole !== null && stabilityMargin(pole, timeBase) > 0;
}

function notStabilizable(data: Facts, model: PlantModel): RefusalWords {
  // A mode that decays is refused only where a degree of stability asks for more than that.
  const tooSlow = decays(data, model);
  const why = tooSlow ? "it decays more slowly than the degree of stability asks for" : "it does not decay by itself";
  const what = tooSlow ? "can hasten it" : "can hold it";
  return {
    title: tooSlow ? "Cannot be made that stable" : "Cannot be stabilised",
    sentence: `No input moves ${modeOf(data, model)}, and ${why}${distance(data)}: no gain on ${names(model.inputs)} ${what}.`,
    nextStep: tooSlow
      ? "Ask for a smaller degree of stability, or add an input that acts on this state."
      : "Add an input that acts on this state, or check its row in A and B for a missing entry.",
  };
}

function unweightedBoundaryMode(data: Facts, model: PlantModel): RefusalWords {
  const mode = `${modeOf(data, model)}, which stands on the stability boundary`;
  if (ofObserver(data)) {
    return {
      title: "The noise overlooks a mode",
      sentence: `The process noise never stirs ${mode}: the best observer would no longer correct its estimate of it.`,
      nextStep: "Give a state that takes part in this mode some process noise, however small, or choose the observer by poles.",
    };
  }
  return {
    title: "The weights overlook a mode",
    sentence: `The weights put no price on ${mode}: the cheapest control leaves it there.`,
    nextStep: "Give a state that takes part in this mode a weight, however small, or ask for a degree of stability.",
  };
}

/** Refusals about what inputs reach and outputs see. */
export const explainStructure: Pick<
  Explainers,
  "not-stabilizable" | "not-detectable" | "not-controllable" | "not-observable" | "not-stable" | "unweighted-boundary-mode"
> = {
  "not-stabilizable": notStabilizable,
  "not-detectable": (data, model) => ({
    title: "Cannot be estimated",
    sentence: `No output shows ${modeOf(data, model)}, and it does not decay by itself${distance(data)}: an estimate from ${names(model.outputs)} would drift away from it.`,
    nextStep: "Add a sensor that sees this state, or check its column in A and C for a missing entry.",
  }),
  "not-controllable": (data, model) => ({
    title: "A pole cannot be moved",
    sentence: `No input moves ${modeOf(data, model)}${distance(data)}: it stays where it is under every gain.`,
    nextStep: decays(data, model)
      ? "Design by weights instead, which leaves this mode as it is, or add an input that acts on the state."
      : "Add an input that acts on this state, or check its row in A and B for a missing entry.",
  }),
  "not-observable": (data, model) => ({
    title: "A pole of the observer cannot be moved",
    sentence: `No output shows ${modeOf(data, model)}${distance(data)}: the estimation error keeps this pole under every observer gain.`,
    nextStep: decays(data, model)
      ? "Choose the observer by noise instead, which leaves this mode as it is, or add a sensor that sees the state."
      : "Add a sensor that sees this state, or check its column in A and C for a missing entry.",
  }),
  "not-stable": (data, model) => ({
    title: "Defined for a stable plant only",
    sentence: `What inputs put into the states and outputs draw from them is summed over all time, and ${modeOf(data, model)} does not decay: the sum has no end.`,
    nextStep: "Close a stabilising loop first and ask this of the closed loop.",
  }),
  "unweighted-boundary-mode": unweightedBoundaryMode,
};
