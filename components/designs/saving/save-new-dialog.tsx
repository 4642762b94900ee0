"use client";

import { useRouter } from "next/navigation";
import { type FormEvent, useState } from "react";
import { useToast } from "../../providers/toast-provider";
import { Button } from "../../ui/button";
import { Dialog } from "../../ui/dialog";
import { TextArea } from "../../ui/text-area";
import { TextField } from "../../ui/text-field";
import { useSubmit } from "../../ui/use-submit";
import type { Bench } from "../bench/use-bench";
import { Refusal } from "./save-revision-dialog";
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
  const send = async (event: FormEvent) => {
    event.preventDefault();
    await submit.run(async () => {
      const made = await saving.saveAsNew(name.trim(), note.trim());
      if (!made) return;
      bench.forget();
      say({ text: `“${made.name}” is saved.`, kind: "met" });
      router.push(`/plants/${plantId}/designs/${made.id}`);
      router.refresh();
    });
  };
  return (
    <Dialog open={open} onClose={onClose} title={bench.base.design ? "Save as a new design" : "Save the design"}>
      <form onSubmit={send} noValidate className="flex flex-col gap-4">
        <Refusal submit={submit} model={bench.ground.model} />
        <TextField
          id={FIELDS["/name"]}
          label="Name of the design"
          hint="For example what it is for: “Quiet beam, second weighting”."
          maxLength={120}
          value={name}
          problem={submit.at("/name")}
          onChange={({ target }) => setName(target.value)}
        />
        <TextArea
          id={FIELDS["/note"]}
          label="Note for the first revision"
          optional
          maxLength={2000}
          value={note}
          problem={submit.at("/note")}
          onChange={({ target }) => setNote(target.value)}
        />
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={onClose}>Go on editing</Button>
          <Button type="submit" tone="primary" busy={submit.busy}>
            {submit.busy ? "Solving and saving…" : "Save"}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
