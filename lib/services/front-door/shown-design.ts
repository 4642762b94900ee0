import "server-only";
import { computeDesign } from "@/control/design/compute-design";
import type { GainEvidence } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import { withoutCurves } from "@/control/words/evidence-in-words";
import { type ResponseCurves, ResponseFigures } from "@/lib/schemas/evidence";
import { toCurves } from "../designs/to-curves";
import { MIRROR_RECIPE, mirrorHead } from "./mirror-head";

export type ShownDesign = {
  readonly model: PlantModel;
  readonly gains: GainEvidence;
  readonly curves: readonly ResponseCurves[];
  readonly figures: ResponseFigures;
};

const DIGITS = 5;
const STRIDE = 2;

let shown: ShownDesign | undefined;

/** The design on the front door: computed when first asked for, by the same core as everybody's. */
export function shownDesign(): ShownDesign {
  shown ??= compute();
  return shown;
}

function compute(): ShownDesign {
  const model = mirrorHead();
  const { gains, responses } = computeDesign(model, MIRROR_RECIPE);
  if (gains.state === "refused" || responses.state === "refused") throw new Error("The front door's own example was refused.");
  const steps = responses.value.records.filter(({ kind }) => kind === "step");
  return {
    model,
    gains: gains.value,
    curves: steps.map((record) => thinned(toCurves(record, model, ["commanded", "input"]))),
    figures: ResponseFigures.parse(withoutCurves(responses.value)),
  };
}

/** Every second sample and as many digits as the eye can use: the curves travel within the page. */
function thinned({ values, step, ...curves }: ResponseCurves): ResponseCurves {
  const kept = values.map((line) => line.filter((_, k) => k % STRIDE === 0).map((value) => Number(value.toPrecision(DIGITS))));
  return { ...curves, step: step * STRIDE, samples: kept[0]?.length ?? 0, values: kept };
}
