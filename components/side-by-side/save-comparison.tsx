"use client";

import { useQueryClient } from "@tanstack/react-query";
import { type FormEvent, useState } from "react";
import { designKeys, saveComparison } from "@/lib/client/designs";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";
import { Dialog } from "../ui/dialog";
import { FormProblems } from "../ui/form-problems";
import { TextArea } from "../ui/text-area";
import { TextField } from "../ui/text-field";
import { useCreateKey } from "../ui/use-create-key";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/title": "comparison-title", "/note": "comparison-note" };

type SaveComparisonProps = Readonly<{
  plantId: string;
  designRevisionIds: readonly string[];
  onClose: () => void;
}>;

/** Keeps this choice of designs under a title; anybody of the team may. */
export function SaveComparison({ plantId, designRevisionIds, onClose }: SaveComparisonProps) {
  const { resume } = useSession();
  const cache = useQueryClient();
  const say = useToast();
  const keyFor = useCreateKey();
  const [title, setTitle] = useState("");
  const [note, setNote] = useState("");
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    const body = { plantId, title: title.trim(), note: note.trim(), designRevisionIds: [...designRevisionIds] };
    const saved = await run(() => resume(() => saveComparison(body, keyFor(body))));
    if (!saved) return;
    await cache.invalidateQueries({ queryKey: designKeys.comparisons(plantId) });
    say({ text: `“${body.title}” is saved below and with the designs of the plant.`, kind: "met" });
    onClose();
  };
  return (
    <Dialog open onClose={onClose} title="Save this comparison">
      <form onSubmit={send} noValidate className="flex flex-col gap-4">
        <FormProblems {...{ attempt, problems }} />
        <TextField
          id={FIELDS["/title"]}
          label="Title"
          hint="For example what is to be decided: “Which weighting for the quiet beam”."
          maxLength={120}
          value={title}
          problem={at("/title")}
          onChange={({ target }) => setTitle(target.value)}
        />
        <TextArea
          id={FIELDS["/note"]}
          label="Note"
          optional
          maxLength={2000}
          value={note}
          problem={at("/note")}
          onChange={({ target }) => setNote(target.value)}
        />
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button type="submit" tone="primary" busy={busy}>
            Save comparison
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
