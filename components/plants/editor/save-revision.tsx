"use client";

import { useState } from "react";
import { addPlantRevision } from "@/lib/client/plants";
import type { Plant, PlantContent } from "@/lib/schemas/plant";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { DialogForm } from "../../ui/dialog-form";
import { NoteField } from "../../ui/note-field";
import { useSubmit } from "../../ui/use-submit";
import { changePastOthers, isStale } from "../change-past-others";
import { PlantConflict } from "./plant-conflict";

const FIELDS = { "/note": "revision-note" };

type SaveRevisionProps = Readonly<{
  plant: Plant;
  content: PlantContent;
  /** What the edit started from. */
  from: { readonly version: number; readonly revisionId: string | null };
  disabled: boolean;
  onSaved: (saved: Plant, content: PlantContent) => void;
  onTakeTheirs: () => void;
  onCopied: () => void;
}>;

/** Adds an immutable revision. Somebody else's newer one is never overwritten without a look. */
export function SaveRevision({ plant, content, from, disabled, onSaved, onTakeTheirs, onCopied }: SaveRevisionProps) {
  const { resume } = useSession();
  const [asking, setAsking] = useState(false);
  const [conflict, setConflict] = useState(false);
  const [note, setNote] = useState("");
  const submit = useSubmit(FIELDS);

  /** A new name or other criteria are no other model: nobody has to choose between them and this edit. */
  const sameModel = ({ currentRevision, archivedAt }: Plant) =>
    currentRevision.id === from.revisionId && archivedAt === plant.archivedAt;

  async function save(atVersion: number) {
    await submit.run(async () => {
      try {
        const send = (version: number) => addPlantRevision(plant.id, version, { content, note });
        const saved = await resume(() => changePastOthers(plant.id, atVersion, send, sameModel));
        setAsking(false);
        setConflict(false);
        setNote("");
        onSaved(saved, content);
      } catch (error) {
        if (!isStale(error)) throw error;
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
        onSend={() => save(from.version)}
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
          startedFrom={from.revisionId}
          busy={submit.busy}
          onClose={() => setConflict(false)}
          onKeepMine={save}
        />
      ) : null}
    </>
  );
}
