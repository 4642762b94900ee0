"use client";

import type { PlantModel } from "@/control/plant/model";
import { FormProblems } from "../../ui/form-problems";
import type { Submit } from "../../ui/use-submit";
import { isUnsolvable } from "../bench/recipe-refusal";
import { SolveRefusal } from "../bench/solve-refusal";

/** Why a save was refused: the recipe cannot be solved, or a field wants mending. */
export function SaveRefusal({ submit, model }: Readonly<{ submit: Submit; model: PlantModel }>) {
  const { refusal, attempt, problems } = submit;
  if (refusal && isUnsolvable(refusal)) return <SolveRefusal problem={refusal} model={model} />;
  return <FormProblems {...{ attempt, problems }} />;
}
