"use client";

import { useState } from "react";
import { useToast } from "../../providers/toast-provider";
import { DialogForm } from "../../ui/dialog-form";
import { NoteField } from "../../ui/note-field";
import { useSubmit } from "../../ui/use-submit";
import type { Bench } from "../bench/use-bench";
import { recipeDifferences } from "../recipe/recipe-lines";
import { RecipeChanges } from "./recipe-changes";
import { SaveRefusal } from "./save-refusal";
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
  const send = async () => {
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
    <DialogForm
      {...{ submit, open, onClose }}
      title={`Save revision ${next}`}
      wide
      leave="Go on editing"
      label={`Save revision ${next}`}
      busyLabel={saving.waiting ? "Waiting for a connection…" : "Solving and saving…"}
      refusal={<SaveRefusal submit={submit} waiting={saving.waiting} model={ground.model} />}
      onSend={send}
    >
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
      <NoteField
        id={FIELDS["/note"]}
        label="Note for this revision"
        value={note}
        problem={submit.at("/note")}
        onChange={setNote}
      />
    </DialogForm>
  );
}
