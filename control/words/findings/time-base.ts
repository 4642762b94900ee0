import type { PlantModel } from "../../plant/model";
import type { PlantChecks } from "../../plant/report";
import type { Finding } from "./finding";

/** A question, not a verdict: empty when the matrix looks like what it is declared to be. */
export function timeBaseFinding({ timeBaseSuspicion }: PlantChecks, model: PlantModel): Finding[] {
  if (timeBaseSuspicion === null) return [];
  const sentence =
    timeBaseSuspicion.looks === "sampled"
      ? "The plant is declared continuous, yet all its poles lie inside the unit circle and most of them near 1, as those of a sampled model do. A gain designed on the wrong time base does not hold the machine."
      : `The plant is declared sampled${model.timeBase.kind === "sampled" ? ` every ${model.timeBase.period} s` : ""}, yet a pole lies so far outside the unit circle that its motion would more than triple with every sample. The matrix looks continuous.`;
  return [{ key: "time-base", tone: "caution", headline: `Is this a ${timeBaseSuspicion.looks} model?`, sentence }];
}
