import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import type { NamedCurves } from "@/control/response/named-curves";
import type { EvidenceInWords } from "@/control/words/evidence-in-words";

/** What the page asks of its worker. */
export type LiveJob = { readonly id: number; readonly model: PlantModel; readonly recipe: Recipe };

export type LiveSolution = {
  readonly evidence: EvidenceInWords;
  readonly curves: readonly NamedCurves[];
  /** How long the core worked. */
  readonly milliseconds: number;
};

export type LiveAnswer = { readonly id: number } & (
  | { readonly outcome: "solved"; readonly solution: LiveSolution }
  | { readonly outcome: "failed"; readonly message: string }
);
