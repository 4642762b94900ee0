"use client";

import { useState } from "react";
import { requestReset } from "@/lib/client/account";
import { Notice } from "../ui/notice";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { EmailField } from "./email-field";

const FIELDS = { "/email": "reset-email" };

/** Says the same whether or not the address is known. */
export function ForgottenPasswordForm() {
  const [sentTo, setSentTo] = useState<string | null>(null);
  const submit = useSubmit(FIELDS);

  async function ask(typed: (name: string) => string) {
    const email = typed("email");
    setSentTo(null);
    if (await submit.run(() => requestReset(email))) setSentTo(email);
  }

  return (
    <AccountForm
      submit={submit}
      refused="No mail was sent."
      label="Send the link"
      busyLabel="Sending…"
      tone="primary"
      onSend={ask}
    >
      {sentTo ? (
        <Notice kind="met" title="A mail is on its way," role="status">
          if {sentTo} has an account. Its link works once, for an hour.
        </Notice>
      ) : null}
      <EmailField id={FIELDS["/email"]} problem={submit.at("/email")} />
    </AccountForm>
  );
}
