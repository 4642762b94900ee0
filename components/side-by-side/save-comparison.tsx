"use client";

import { useQueryClient } from "@tanstack/react-query";
import { useState } from "react";
import { designKeys, saveComparison } from "@/lib/client/designs";
import { useSession } from "../providers/session-provider";
import { useToast } from "../providers/toast-provider";
import { DialogForm } from "../ui/dialog-form";
import { NameField } from "../ui/name-field";
import { NoteField } from "../ui/note-field";
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
  const submit = useSubmit(FIELDS);
  const send = async () => {
    const body = { plantId, title: title.trim(), note: note.trim(), designRevisionIds: [...designRevisionIds] };
    const saved = await submit.run(() => resume(() => saveComparison(body, keyFor(body))));
    if (!saved) return;
    await cache.invalidateQueries({ queryKey: designKeys.comparisons(plantId) });
    say({ text: `“${body.title}” is saved below and with the designs of the plant.`, kind: "met" });
    onClose();
  };
  return (
    <DialogForm {...{ submit, onClose }} title="Save this comparison" leave="Leave it" label="Save comparison" onSend={send}>
      <NameField
        id={FIELDS["/title"]}
        label="Title"
        hint="For example what is to be decided: “Which weighting for the quiet beam”."
        value={title}
        problem={submit.at("/title")}
        onChange={setTitle}
      />
      <NoteField id={FIELDS["/note"]} label="Note" value={note} problem={submit.at("/note")} onChange={setNote} />
    </DialogForm>
  );
}
