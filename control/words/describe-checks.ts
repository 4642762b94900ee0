import type { PlantModel } from "../plant/model";
import type { PlantChecks } from "../plant/report";
import { couplingFinding } from "./findings/coupling";
import type { Finding } from "./findings/finding";
import { sightFinding, steeringFinding } from "./findings/reach";
import { scalingFinding } from "./findings/scaling";
import { stabilityFinding } from "./findings/stability";
import { timeBaseFinding } from "./findings/time-base";
import { zerosFinding } from "./findings/zeros";

/**
 * What the checks say, in the order in which a reviewer asks. Nothing is said of a time base that raises no doubt.
 *
 * Shapes    the checks of that plant
 * Units     in the sentences
 * Throws    nothing
 * Accuracy  figures rounded for reading
 * Source    the verdicts of `checkPlant`
 */
export function describeChecks(checks: PlantChecks, model: PlantModel): Finding[] {
  return [
    ...timeBaseFinding(checks, model),
    stabilityFinding(checks, model),
    steeringFinding(checks, model),
    sightFinding(checks, model),
    zerosFinding(checks, model),
    couplingFinding(checks, model),
    scalingFinding(checks, model),
  ];
}

export type { Finding };
