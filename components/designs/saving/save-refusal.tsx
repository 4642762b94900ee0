"use client";

import type { PlantModel } from "@/control/plant/model";
import { FormProblems } from "../../ui/form-problems";
import { Notice } from "../../ui/notice";
import type { Submit } from "../../ui/use-submit";
import { isUnsolvable } from "../bench/recipe-refusal";
import { SolveRefusal } from "../bench/solve-refusal";

type SaveRefusalProps = Readonly<{
  submit: Submit;
  model: PlantModel;
  /** For the connection. */
  waiting: boolean;
}>;

/** Why a save was refused, or waits: the recipe cannot be solved, a field wants mending, or nothing answers. */
export function SaveRefusal({ submit, model, waiting }: SaveRefusalProps) {
  if (waiting) {
    return (
      <Notice kind="caution" role="status" title="No connection: this waits.">
        It is saved by itself, once, as soon as the service answers. Close this to give it up.
      </Notice>
    );
  }
  const { refusal, attempt, problems } = submit;
  if (refusal && isUnsolvable(refusal)) return <SolveRefusal problem={refusal} model={model} />;
  return <FormProblems {...{ attempt, problems }} />;
}
