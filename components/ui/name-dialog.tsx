"use client";

import { type FormEvent, useState } from "react";
import { Button } from "./button";
import { Dialog } from "./dialog";
import { FormProblems } from "./form-problems";
import { TextField } from "./text-field";
import { useSubmit } from "./use-submit";

const FIELDS = { "/name": "asked-name" };

type NameDialogProps = Readonly<{
  title: string;
  /** What is named: "Name of the plant". */
  label: string;
  confirm: string;
  start: string;
  onClose: () => void;
  /** @throws RequestProblem */
  onName: (name: string) => Promise<void>;
}>;

/** Asks for a name: to rename, or for a duplicate. */
export function NameDialog({ title, label, confirm, start, onClose, onName }: NameDialogProps) {
  const [name, setName] = useState(start);
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);
  const send = async (event: FormEvent) => {
    event.preventDefault();
    if (await run(() => onName(name.trim()))) onClose();
  };
  return (
    <Dialog open onClose={onClose} title={title}>
      <form onSubmit={send} noValidate className="flex flex-col gap-4">
        <FormProblems {...{ attempt, problems }} />
        <TextField
          id={FIELDS["/name"]}
          label={label}
          maxLength={120}
          value={name}
          problem={at("/name")}
          onChange={({ target }) => setName(target.value)}
        />
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={onClose}>Leave it</Button>
          <Button type="submit" tone="primary" busy={busy}>
            {confirm}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
