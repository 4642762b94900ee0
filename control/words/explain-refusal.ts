import type { NumericalErrorCode } from "../errors";
import type { PlantModel } from "../plant/model";
import { formatNumber } from "./format-number";
import { explainDesign } from "./refusals/design";
import { explainExpression } from "./refusals/expression";
import { explainMatrix } from "./refusals/matrix";
import { explainPoles } from "./refusals/poles";
import { explainStructure } from "./refusals/structure";
import type { Explainers, Facts, RefusalWords } from "./refusals/types";

const EXPLAINERS: Explainers = { ...explainMatrix, ...explainStructure, ...explainDesign, ...explainPoles, ...explainExpression };

/**
 * A refusal in plain words: which assumption failed, with the reader's own signal names, and one change to try.
 * Never throws, whatever `data` holds: a fact that is missing is left out of the sentence.
 *
 * Shapes    the code and the facts of a `NumericalError`, and the plant that was refused
 * Units     in the sentences
 * Throws    nothing
 * Accuracy  figures rounded for reading
 * Source    the facts listed beside `NumericalErrorCode`
 */
export function explainRefusal(code: NumericalErrorCode, data: Facts, model: PlantModel): RefusalWords {
  const explain = Object.hasOwn(EXPLAINERS, code) ? EXPLAINERS[code] : unknownReason;
  return explain(data, model);
}

function unknownReason(data: Facts): RefusalWords {
  const numbers = Object.entries(data).flatMap(([name, value]) =>
    typeof value === "number" ? [`${name} ${formatNumber(value)}`] : [],
  );
  return {
    title: "Not computed",
    sentence: `This part could not be computed${numbers.length > 0 ? ` (${numbers.join(", ")})` : ""}.`,
    nextStep: "Check the plant's entries and units, and compute again.",
  };
}
