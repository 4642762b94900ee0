"use client";

import type { FormEvent } from "react";
import { Button } from "./button";
import { Dialog } from "./dialog";
import { FormProblems } from "./form-problems";
import { TextField } from "./text-field";
import type { Submit } from "./use-submit";

type NameDialogProps = Readonly<{
  open: boolean;
  onClose: () => void;
  title: string;
  label: string;
  fieldId: string;
  start: string;
  action: string;
  form: Submit;
  onSubmit: (name: string) => unknown;
}>;

/** Asks for one name. */
export function NameDialog({ open, onClose, title, label, fieldId, start, action, form, onSubmit }: NameDialogProps) {
  const submit = (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    onSubmit(String(new FormData(event.currentTarget).get("name")));
  };
  return (
    <Dialog open={open} onClose={onClose} title={title}>
      <form onSubmit={submit} noValidate>
        <FormProblems attempt={form.attempt} problems={form.problems} />
        <TextField id={fieldId} name="name" label={label} defaultValue={start} maxLength={120} problem={form.at("/name")} />
        <div className="mt-4 flex justify-end gap-3">
          <Button onClick={onClose}>Cancel</Button>
          <Button type="submit" tone="primary" busy={form.busy}>
            {action}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
