"use client";

import type { FormEvent, ReactNode } from "react";
import { Button } from "./button";
import { Dialog } from "./dialog";
import { FormProblems } from "./form-problems";
import type { Submit } from "./use-submit";

type DialogFormProps = Readonly<{
  submit: Submit;
  open?: boolean;
  onClose: () => void;
  title: string;
  /** The way out without sending: "Go on editing". */
  leave: string;
  /** On the button, and on it while it works. */
  label: string;
  busyLabel?: string;
  wide?: boolean;
  /** Why it was refused, where a list of fields does not say it. */
  refusal?: ReactNode;
  onSend: () => Promise<unknown>;
  children: ReactNode;
}>;

/** Asks for a few fields over the page: what is wrong above them, the two ways on below. Values are the caller's. */
export function DialogForm({ submit, open = true, onClose, title, wide, onSend, children, ...words }: DialogFormProps) {
  const { attempt, problems, busy } = submit;
  const { leave, label, busyLabel = label, refusal } = words;
  const send = (event: FormEvent) => {
    event.preventDefault();
    void onSend();
  };
  return (
    <Dialog open={open} onClose={onClose} title={title} wide={wide}>
      <form onSubmit={send} noValidate className="flex flex-col gap-4">
        {refusal ?? <FormProblems {...{ attempt, problems }} />}
        {children}
        <div className="flex flex-wrap justify-end gap-3">
          <Button onClick={onClose}>{leave}</Button>
          <Button type="submit" tone="primary" busy={busy}>
            {busy ? busyLabel : label}
          </Button>
        </div>
      </form>
    </Dialog>
  );
}
