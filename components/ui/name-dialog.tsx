"use client";

import { useState } from "react";
import { DialogForm } from "./dialog-form";
import { NameField } from "./name-field";
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
  const submit = useSubmit(FIELDS);
  const send = async () => {
    if (await submit.run(() => onName(name.trim()))) onClose();
  };
  return (
    <DialogForm submit={submit} onClose={onClose} title={title} leave="Leave it" label={confirm} onSend={send}>
      <NameField id={FIELDS["/name"]} label={label} value={name} problem={submit.at("/name")} onChange={setName} />
    </DialogForm>
  );
}
