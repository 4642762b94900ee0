"use client";

import { type FormEvent, useState } from "react";
import { requestReset } from "@/lib/client/account";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { Notice } from "../ui/notice";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/email": "reset-email" };

/** Says the same whether or not the address is known. */
export function ForgottenPasswordForm() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const email = String(new FormData(event.currentTarget).get("email"));
    setSentTo(null);
    if (await run(() => requestReset(email))) setSentTo(email);
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="No mail was sent." {...{ attempt, problems }} />
      {sentTo ? (
        <Notice kind="met" title="A mail is on its way," role="status">
          if {sentTo} has an account. Its link works once, for an hour.
        </Notice>
      ) : null}
      <TextField
        id={FIELDS["/email"]}
        name="email"
        type="email"
        label="E-mail address"
        autoComplete="username"
        problem={at("/email")}
      />
      <div>
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Sending…" : "Send the link"}
        </Button>
      </div>
    </form>
  );
}
