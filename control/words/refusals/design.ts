import type { PlantModel } from "../../plant/model";
import { formatNumber } from "../format-number";
import { modeOf, numberOf, ofObserver, signalName, textOf } from "./facts";
import type { Explainers, Facts, RefusalWords } from "./types";

const OPTIONS: Readonly<Record<string, string>> = {
  period: "The sample time",
  degreeOfStability: "The degree of stability",
  horizon: "The length of the response",
  frequency: "A frequency",
};

function badOption(data: Facts, model: PlantModel): RefusalWords {
  const option = textOf(data, "option") ?? "";
  const index = numberOf(data, "index");
  const given = numberOf(data, "given");
  const signals: Readonly<Record<string, readonly { readonly name: string }[]>> = { states: model.states, inputs: model.inputs };
  const signal = Object.hasOwn(signals, option) ? signalName(signals[option], index, option.slice(0, -1)) : null;
  const entry = option === "poles" && index !== null ? `Entry ${index + 1} of the pole list` : null;
  const named = Object.hasOwn(OPTIONS, option) ? OPTIONS[option] : "A setting";
  const name = signal !== null ? `The acceptable deviation of ${signal}` : (entry ?? named);
  if (option === "poles" && entry !== null && isTooFast(data, model)) {
    return {
      title: "Too fast for the sample time",
      sentence: `${entry} asks for an oscillation beyond half the sampling rate, which samples cannot tell from a slower one.`,
      nextStep: "Choose a lower frequency, or enter the pole in the z-plane.",
    };
  }
  return {
    title: "A setting is out of range",
    sentence: `${name} has a value that it cannot take${given === null ? "" : ` (${formatNumber(given)})`}.`,
    nextStep:
      option === "poles"
        ? "Enter finite numbers: a frequency or time constant above zero, and a damping ratio that is not negative."
        : "Enter a positive, finite value in the unit shown beside it.",
  };
}

/** A damping entry of a sampled plant whose oscillation takes less than two samples. */
function isTooFast({ given }: Facts, { timeBase }: PlantModel): boolean {
  if (timeBase.kind !== "sampled" || typeof given !== "object" || given === null) return false;
  if (!("frequency" in given) || !("damping" in given)) return false;
  const { frequency, damping } = given;
  if (typeof frequency !== "number" || typeof damping !== "number") return false;
  return damping * damping < 1 && frequency * Math.sqrt(1 - damping * damping) * timeBase.period > Math.PI;
}

/** Refusals about the outcome of a design and its settings. */
export const explainDesign: Pick<
  Explainers,
  "on-stability-boundary" | "not-stabilising" | "inaccurate" | "period-missing" | "bad-option"
> = {
  "on-stability-boundary": (data) => {
    const distance = numberOf(data, "distance");
    return {
      title: "The best loop would stand on the stability boundary",
      sentence: `With ${ofObserver(data) ? "this noise the best observer" : "these weights the optimal loop"} comes so close to the boundary that it cannot be told from it${
        distance === null ? "" : ` (distance ${formatNumber(distance, 2)})`
      }.`,
      nextStep: ofObserver(data)
        ? "Give the slow or undamped states more process noise, or choose the observer by poles."
        : "Weight the slow or undamped states more, or ask for a degree of stability.",
    };
  },
  "not-stabilising": (data, model) => ({
    title: "The gain did not pass its check",
    sentence: `With the computed gain the loop keeps ${modeOf(data, model)}, which does not decay, so the gain is not shown.`,
    nextStep:
      "Bring the weights nearer to each other (ratios beyond 1e12 lose all digits), and see in the plant's checks which mode is hard to reach.",
  }),
  inaccurate: (data) => {
    const residual = numberOf(data, "residual");
    const bound = numberOf(data, "bound");
    return {
      title: "The result did not pass its check",
      sentence: `Put back into its equation the result leaves a remainder${
        residual === null || bound === null ? "" : ` of ${formatNumber(residual, 2)}, where ${formatNumber(bound, 2)} is allowed`
      }, so it is not shown.`,
      nextStep: `Declare the largest acceptable deviation of each signal so that the problem is scaled, and bring the ${
        ofObserver(data) ? "poles or noise levels of the observer" : "weights or poles"
      } nearer to each other.`,
    };
  },
  "period-missing": () => ({
    title: "Sample time missing",
    sentence: "The plant is sampled, and this needs its sample time.",
    nextStep: "Enter the sample time of the plant in seconds.",
  }),
  "bad-option": badOption,
};
