"use client";

import { useState } from "react";
import { addPlantRevision } from "@/lib/client/plants";
import { RequestProblem } from "@/lib/client/request";
import type { PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { DialogForm } from "../../ui/dialog-form";
import { NoteField } from "../../ui/note-field";
import { useSubmit } from "../../ui/use-submit";
import { PlantConflict } from "./plant-conflict";

const FIELDS = { "/note": "revision-note" };

type SaveRevisionProps = Readonly<{
  plant: PlantSummary;
  content: PlantContent;
  /** The version the edit started from. */
  version: number;
  disabled: boolean;
  onSaved: (saved: PlantSummary, content: PlantContent) => void;
  onTakeTheirs: () => void;
  onCopied: () => void;
}>;

/** Adds an immutable revision. Somebody else's newer one is never overwritten without a look. */
export function SaveRevision({ plant, content, version, disabled, onSaved, onTakeTheirs, onCopied }: SaveRevisionProps) {
  const { resume } = useSession();
  const [asking, setAsking] = useState(false);
  const [conflict, setConflict] = useState(false);
  const [note, setNote] = useState("");
  const submit = useSubmit(FIELDS);

  async function save(atVersion: number) {
    await submit.run(async () => {
      try {
        const saved = await resume(() => addPlantRevision(plant.id, atVersion, { content, note }));
        setAsking(false);
        setConflict(false);
        setNote("");
        onSaved(saved, content);
      } catch (error) {
        if (!(error instanceof RequestProblem && error.code === "stale-version")) throw error;
        setAsking(false);
        setConflict(true);
      }
    });
  }

  return (
    <>
      <Button tone="primary" disabled={disabled} onClick={() => setAsking(true)}>
        Save revision {plant.currentRevision.number + 1}
      </Button>
      <DialogForm
        submit={submit}
        open={asking}
        onClose={() => setAsking(false)}
        title={`Save revision ${plant.currentRevision.number + 1} of ${plant.name}`}
        leave="Go on editing"
        label="Save"
        busyLabel="Saving…"
        onSend={() => save(version)}
      >
        <NoteField
          id={FIELDS["/note"]}
          label="What changed and why"
          value={note}
          problem={submit.at("/note")}
          onChange={setNote}
        />
        <p className="text-sm text-soft">Designs made on earlier revisions stay as they are and are marked as outdated.</p>
      </DialogForm>
      {conflict ? (
        <PlantConflict
          {...{ plant, content, onTakeTheirs, onCopied }}
          busy={submit.busy}
          onClose={() => setConflict(false)}
          onKeepMine={save}
        />
      ) : null}
    </>
  );
}
