"use client";

import { type FormEvent, useState } from "react";
import { addPlantRevision } from "@/lib/client/plants";
import { RequestProblem } from "@/lib/client/request";
import type { PlantContent, PlantSummary } from "@/lib/schemas/plant";
import { useSession } from "../../providers/session-provider";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { FormProblems } from "../../ui/form-problems";
import { TextArea } from "../../ui/text-area";
import { useSubmit } from "../../ui/use-submit";
import { PlantConflict } from "./plant-conflict";

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
  const { busy, attempt, problems, at, run } = useSubmit({ "/note": "revision-note" });

  async function save(atVersion: number) {
    await run(async () => {
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

  const submit = (event: FormEvent) => {
    event.preventDefault();
    void save(version);
  };
  return (
    <>
      <Button tone="primary" disabled={disabled} onClick={() => setAsking(true)}>
        Save revision {plant.currentRevision.number + 1}
      </Button>
      <Dialog
        open={asking}
        onClose={() => setAsking(false)}
        title={`Save revision ${plant.currentRevision.number + 1} of ${plant.name}`}
      >
        <form onSubmit={submit}>
          <FormProblems {...{ attempt, problems }} />
          <TextArea
            id="revision-note"
            label="What changed and why"
            optional
            maxLength={2000}
            value={note}
            problem={at("/note")}
            onChange={({ target }) => setNote(target.value)}
          />
          <p className="mt-2 text-sm text-soft">Designs made on earlier revisions stay as they are and are marked as outdated.</p>
          <div className="mt-4 flex justify-end gap-3">
            <Button onClick={() => setAsking(false)}>Go on editing</Button>
            <Button type="submit" tone="primary" busy={busy}>
              {busy ? "Saving…" : "Save"}
            </Button>
          </div>
        </form>
      </Dialog>
      {conflict ? (
        <PlantConflict
          {...{ plant, content, busy, onTakeTheirs, onCopied }}
          onClose={() => setConflict(false)}
          onKeepMine={save}
        />
      ) : null}
    </>
  );
}
