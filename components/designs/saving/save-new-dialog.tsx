"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { useToast } from "../../providers/toast-provider";
import { DialogForm } from "../../ui/dialog-form";
import { NameField } from "../../ui/name-field";
import { NoteField } from "../../ui/note-field";
import { useSubmit } from "../../ui/use-submit";
import type { Bench } from "../bench/use-bench";
import { SaveRefusal } from "./save-refusal";
import type { Saving } from "./use-saving";

const FIELDS = { "/name": "save-new-name", "/note": "save-new-note" };

type SaveNewDialogProps = Readonly<{
  bench: Bench;
  saving: Saving;
  plantId: string;
  /** Offered as its name. */
  suggested: string;
  open: boolean;
  onClose: () => void;
}>;

/** The recipe on the page as a design of its own. */
export function SaveNewDialog({ bench, saving, plantId, suggested, open, onClose }: SaveNewDialogProps) {
  const router = useRouter();
  const say = useToast();
  const [name, setName] = useState(suggested);
  const [note, setNote] = useState("");
  const submit = useSubmit(FIELDS);
  const send = () =>
    submit.run(async () => {
      const made = await saving.saveAsNew(name.trim(), note.trim());
      if (!made) return;
      bench.forget();
      say({ text: `“${made.name}” is saved.`, kind: "met" });
      router.push(`/plants/${plantId}/designs/${made.id}`);
      router.refresh();
    });
  return (
    <DialogForm
      {...{ submit, open, onClose }}
      title={bench.base.design ? "Save as a new design" : "Save the design"}
      leave="Go on editing"
      label="Save"
      busyLabel={saving.waiting ? "Waiting for a connection…" : "Solving and saving…"}
      refusal={<SaveRefusal submit={submit} waiting={saving.waiting} model={bench.ground.model} />}
      onSend={send}
    >
      <NameField
        id={FIELDS["/name"]}
        label="Name of the design"
        hint="For example what it is for: “Quiet beam, second weighting”."
        value={name}
        problem={submit.at("/name")}
        onChange={setName}
      />
      <NoteField
        id={FIELDS["/note"]}
        label="Note for the first revision"
        value={note}
        problem={submit.at("/note")}
        onChange={setNote}
      />
    </DialogForm>
  );
}
