import type { PlantModel } from "../../plant/model";
import type { PlantChecks } from "../../plant/report";
import { formatNumber } from "../format-number";
import { joinNames } from "../join-names";
import type { Finding } from "./finding";

/** Whether the units of the plant, after scaling by declared deviations, leave digits to compute with. */
export function scalingFinding({ scaling }: PlantChecks, model: PlantModel): Finding {
  const assumed = [
    ...namesOf(scaling.assumedStates, model.states),
    ...namesOf(scaling.assumedInputs, model.inputs),
    ...namesOf(scaling.assumedOutputs, model.outputs),
  ];
  const spread = `Largest entry over smallest is ${formatNumber(scaling.spreadAsGiven, 2)} as given and ${formatNumber(scaling.spreadScaled, 2)} after scaling.`;
  const missing =
    assumed.length === 0 ? "" : ` No largest acceptable deviation is declared for ${listed(assumed)}; one was assumed.`;
  if (scaling.caution) {
    return {
      key: "scaling",
      tone: "caution",
      headline: "Entries of very unlike size",
      sentence: `${spread}${missing} ${assumed.length === 0 ? "Check the units of the largest and smallest entries." : "Declare the deviations so that shares and distances mean something."}`,
    };
  }
  const incomplete = scaling.assumedStates.length > 0 || scaling.assumedInputs.length > 0;
  return {
    key: "scaling",
    tone: incomplete ? "caution" : "met",
    headline: incomplete ? "Scaling rests on assumptions" : "Well scaled",
    sentence: `${spread}${missing}`,
  };
}

function namesOf(indices: readonly number[], signals: readonly { readonly name: string }[]): string[] {
  return indices.flatMap((index) => signals[index]?.name ?? []);
}

function listed(names: readonly string[]): string {
  return names.length > 5 ? `${names.slice(0, 4).join(", ")} and ${names.length - 4} more` : joinNames(names);
}
