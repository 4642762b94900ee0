import { formatNumber } from "../format-number";
import { modeOf, numberOf, textOf } from "./facts";
import type { Explainers, RefusalWords } from "./types";

const OPTIONS: Readonly<Record<string, string>> = {
  period: "the sample time",
  poles: "an entry of the pole list",
  degreeOfStability: "the degree of stability",
  horizon: "the length of the response",
};

function badOption(option: string | null, given: number | null): RefusalWords {
  const name = option === null ? "A setting" : (OPTIONS[option] ?? `the setting "${option}"`);
  return {
    title: "A setting is out of range",
    sentence: `${name.charAt(0).toUpperCase()}${name.slice(1)} has a value that it cannot take${given === null ? "" : ` (${formatNumber(given)})`}.`,
    nextStep: "Enter a positive, finite value in the unit shown beside it.",
  };
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
      sentence: `With these weights the optimal loop comes so close to the boundary that it cannot be told from it${
        distance === null ? "" : ` (distance ${formatNumber(distance, 2)})`
      }.`,
      nextStep: "Weight the slow or undamped states more, or ask for a degree of stability.",
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
      nextStep:
        "Declare the largest acceptable deviation of each signal so that the problem is scaled, and bring the weights nearer to each other.",
    };
  },
  "period-missing": () => ({
    title: "Sample time missing",
    sentence: "The plant is sampled, and this needs its sample time.",
    nextStep: "Enter the sample time of the plant in seconds.",
  }),
  "bad-option": (data) => badOption(textOf(data, "option"), numberOf(data, "given")),
};
