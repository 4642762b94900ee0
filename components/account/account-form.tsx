"use client";

import type { FormEvent, ReactNode } from "react";
import { Button } from "../ui/button";
import type { ButtonTone } from "../ui/button-style";
import { FormProblems } from "../ui/form-problems";
import { joinClasses } from "../ui/join-classes";
import type { Submit } from "../ui/use-submit";

type AccountFormProps = Readonly<{
  submit: Submit;
  /** Stands above what is wrong: "The password was not changed." */
  refused: string;
  /** On the button, and on it while it works. */
  label: string;
  busyLabel: string;
  /** Where the button stays busy longer than the request. */
  busy?: boolean;
  tone?: ButtonTone;
  className?: string;
  /** Beside the button. */
  beside?: ReactNode;
  /** `typed` reads a field by its name, as it stood when the form was sent. */
  onSend: (typed: (name: string) => string, form: HTMLFormElement) => Promise<void>;
  children: ReactNode;
}>;

/** What is wrong above the fields, one button below them. Never sent by the browser itself: values stay. */
export function AccountForm({ submit, refused, label, busyLabel, busy = submit.busy, ...rest }: AccountFormProps) {
  const { tone, className, beside, onSend, children } = rest;
  async function send(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = event.currentTarget;
    const entries = new FormData(form);
    await onSend((name) => String(entries.get(name) ?? ""), form);
  }

  return (
    <form method="post" onSubmit={send} noValidate className={joinClasses("flex flex-col gap-4", className)}>
      <FormProblems title={refused} attempt={submit.attempt} problems={submit.problems} />
      {children}
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" tone={tone} busy={busy}>
          {busy ? busyLabel : label}
        </Button>
        {beside}
      </div>
    </form>
  );
}
