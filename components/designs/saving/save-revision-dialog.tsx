"use client";

import { type FormEvent, useState } from "react";
import type { PlantModel } from "@/control/plant/model";
import { useToast } from "../../providers/toast-provider";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { FormProblems } from "../../ui/form-problems";
import { TextArea } from "../../ui/text-area";
import { useSubmit } from "../../ui/use-submit";
import { isUnsolvable } from "../bench/recipe-refusal";
import { SolveRefusal } from "../bench/solve-refusal";
import type { Bench } from "../bench/use-bench";
import { recipeDifferences } from "../recipe/recipe-lines";
import { RecipeChanges } from "./recipe-changes";
import type { Saving } from "./use-saving";

const FIELDS = { "/note": "save-revision-note" };

type SaveRevisionDialogProps = Readonly<{
  bench: Bench;
  saving: Saving;
  open: boolean;
  onClose: () => void;
}>;

/** The next revision of the design, with what changed and a note for those who read it later. */
export function SaveRevisionDialog({ bench, saving, open, onClose }: SaveRevisionDialogProps) {
  const { base, ground, reading } = bench;
  const say = useToast();
  const [note, setNote] = useState("");
  const submit = useSubmit(FIELDS);
  if (!base.design || !base.revision || !reading.recipe) return null;
  const next = base.design.currentRevision.number + 1;
  const differences = open
    ? recipeDifferences({ recipe: base.recipe, model: base.ground.model }, { recipe: reading.recipe, model: ground.model })
    : [];
  const send = async (event: FormEvent) => {
    event.preventDefault();
    let saved = false;
    const sent = await submit.run(async () => {
      saved = await saving.saveRevision(note.trim());
    });
    if (!sent) return;
    onClose();
    if (!saved) return;
    setNote("");
    say({ text: `Revision ${next} is saved.`, kind: "met" });
  };
  return (
    <Dialog open={open} onClose={onClose} title={`Save revision ${next}`} wide>
      <form onSubmit={send} noValidate className="flex flex-col gap-4">
        <Refusal submit={submit} model={ground.model} />
        <RecipeChanges
          caption={`Changed since revision ${base.revision.number}`}
          differences={differences}
          before={`Revision ${base.revision.number}`}
          after={`Revision ${next}`}
        />
        {base.ground.plantRevision.id === ground.plantRevision.id ? null : (
          <p>
            It moves from plant revision {base.ground.plantRevision.number} to {ground.plantRevision.number}.
          </p>
        )}
        <TextArea
          id={FIELDS["/note"]}
          label="Note for this revision"
          optional
          maxLength={2000}
          value={note}
          problem={submit.at("/note")}
          onChange={({ target }) => setNote(target.value)}
        />
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={onClose}>Go on editing</Button>
          <Button type="submit" tone="primary" busy={submit.busy}>
            {submit.busy ? "Solving and saving…" : `Save revision ${next}`}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}

type Submit = ReturnType<typeof useSubmit>;

/** Why a save was refused: the recipe cannot be solved, or a field wants mending. */
export function Refusal({ submit, model }: Readonly<{ submit: Submit; model: PlantModel }>) {
  const { refusal, attempt, problems } = submit;
  if (refusal && isUnsolvable(refusal)) return <SolveRefusal problem={refusal} model={model} />;
  return <FormProblems {...{ attempt, problems }} />;
}
