"use client";

import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import { useToast } from "../../providers/toast-provider";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { useSubmit } from "../../ui/use-submit";
import { whenText } from "../../ui/when-text";
import type { Bench } from "../bench/use-bench";
import { recipeDifferences } from "../recipe/recipe-lines";
import { RecipeChanges } from "./recipe-changes";
import { SaveRefusal } from "./save-refusal";
import type { Conflict, Saving } from "./use-saving";

const FIELDS = {};

type ConflictDialogProps = Readonly<{ bench: Bench; saving: Saving; onCopy: () => void }>;

/** Two people edited the same design: the second sees what differs and chooses. Nothing is saved over unseen. */
export function ConflictDialog({ bench, saving, onCopy }: ConflictDialogProps) {
  const { conflict } = saving;
  const { recipe } = bench.reading;
  if (!conflict || !recipe) return null;
  return <Choices key={conflict.theirs.id} {...{ bench, saving, onCopy, conflict, recipe }} />;
}

function Choices({
  bench,
  saving,
  onCopy,
  conflict,
  recipe,
}: ConflictDialogProps & Readonly<{ conflict: Conflict; recipe: Recipe }>) {
  const say = useToast();
  const submit = useSubmit(FIELDS);
  const { design, theirs, note } = conflict;
  const close = () => {
    saving.stop();
    saving.setConflict(null);
  };
  const next = theirs.number + 1;
  const differences = recipeDifferences(
    { recipe: theirs.recipe, model: theirs.model as PlantModel },
    { recipe, model: bench.ground.model },
  );
  const keepMine = () =>
    submit.run(async () => {
      if (await saving.saveRevision(note, design.version)) say({ text: `Yours is saved as revision ${next}.`, kind: "met" });
    });
  const takeTheirs = () => {
    bench.take(design, theirs);
    close();
    say({ text: `Revision ${theirs.number} is shown. Yours was dropped.`, kind: "met" });
  };
  return (
    <Dialog
      open
      wide
      onClose={close}
      title={`Revision ${theirs.number} was saved while you were editing`}
      actions={
        <>
          <Button onClick={takeTheirs}>Take theirs, drop mine</Button>
          <Button
            onClick={() => {
              close();
              onCopy();
            }}
          >
            Save mine as a copy
          </Button>
          <Button tone="primary" busy={submit.busy} onClick={keepMine}>
            Keep mine as revision {next}
          </Button>
        </>
      }
    >
      <div className="flex flex-col gap-4">
        <SaveRefusal submit={submit} waiting={saving.waiting} model={bench.ground.model} />
        <p>
          {theirs.createdBy ?? "Somebody"} saved it on {whenText(theirs.createdAt)}
          {theirs.note ? `: “${theirs.note}”` : "."} Yours is kept on this page until you choose; theirs stays in the list of
          revisions whatever you do.
        </p>
        <RecipeChanges
          caption="What differs"
          differences={differences}
          before={`Theirs, revision ${theirs.number}`}
          after="Yours"
        />
      </div>
    </Dialog>
  );
}
