import type { Summary } from "@/control/design/evidence";
import type { Recipe, WeightsRecipe } from "@/control/design/recipe";
import type { WeightEffects } from "@/control/design/weight-effects";
import type { PlantModel } from "@/control/plant/model";
import type { Part } from "@/control/plant/report";
import type { NamedCurves } from "@/control/response/named-curves";
import type { EvidenceInWords } from "@/control/words/evidence-in-words";

export type LiveSolution = {
  readonly evidence: EvidenceInWords;
  readonly curves: readonly NamedCurves[];
  /** How long the core worked. */
  readonly milliseconds: number;
};

/** What the page asks of a worker: a whole design, what each weight of it does, or the figures of many recipes. */
export type LiveTask =
  | { readonly kind: "design"; readonly model: PlantModel; readonly recipe: Recipe }
  | { readonly kind: "effects"; readonly model: PlantModel; readonly recipe: WeightsRecipe }
  | { readonly kind: "figures"; readonly model: PlantModel; readonly recipes: readonly Recipe[] };

export type LiveValues = {
  readonly design: LiveSolution;
  readonly effects: Part<WeightEffects>;
  readonly figures: readonly Part<Summary>[];
};

export type LiveJob = LiveTask & { readonly id: number };

export type LiveAnswer = { readonly id: number } & (
  | { readonly outcome: "done"; readonly value: LiveValues[LiveTask["kind"]] }
  /** How many parts of the work are done. */
  | { readonly outcome: "progress"; readonly done: number }
  | { readonly outcome: "failed"; readonly message: string }
);
