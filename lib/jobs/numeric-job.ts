import type { Evidence } from "@/control/design/evidence";
import type { Recipe } from "@/control/design/recipe";
import type { NumericalErrorCode } from "@/control/errors";
import type { PlantContent } from "@/control/plant/content";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import type { PlantModel } from "@/control/plant/model";
import type { PlantChecks } from "@/control/plant/report";

export type ChecksJob = { readonly kind: "checks"; readonly model: PlantModel };
export type DesignJob = { readonly kind: "design"; readonly model: PlantModel; readonly recipe: Recipe };
export type EvaluationJob = { readonly kind: "evaluation"; readonly content: PlantContent };
export type NumericJob = ChecksJob | DesignJob | EvaluationJob;

/** A plant as typed turned into doubles, or what is in the way. */
export type PlantVerdict = Pick<PlantEvaluation, "model" | "problems">;
export type NumericValue = PlantChecks | Evidence | PlantVerdict;

/** What a worker answers. A refusal crosses the boundary as code and data and is made an error again on the other side. */
export type NumericAnswer =
  | { readonly outcome: "done"; readonly value: NumericValue }
  | { readonly outcome: "refused"; readonly code: NumericalErrorCode; readonly data: Readonly<Record<string, unknown>> }
  | { readonly outcome: "failed"; readonly message: string; readonly stack: string };
