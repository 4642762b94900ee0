"use client";

import { type FormEvent, useState } from "react";
import { Button } from "../ui/button";
import { TextField } from "../ui/text-field";
import { invitationSecret } from "./invitation-link";

const FIELD = "invitation-link";

/** Leads to the invitation's own page, which says who invites and to what before anything is accepted. */
export function InvitationLinkForm() {
  const [problem, setProblem] = useState<string>();

  function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const pasted = String(new FormData(event.currentTarget).get("link"));
    const secret = invitationSecret(pasted);
    if (secret) return window.location.assign(`/invitations/${secret}`);
    setProblem(
      pasted.trim() === ""
        ? "Paste the link from the invitation mail here"
        : "This is not a whole invitation link. Copy it from the mail, up to its last sign",
    );
    document.getElementById(FIELD)?.focus();
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-3">
      <TextField
        id={FIELD}
        name="link"
        label="Link of an invitation"
        autoComplete="off"
        spellCheck={false}
        problem={problem}
        hint="It came by mail, works once and for seven days."
      />
      <div>
        <Button type="submit">Look at the invitation</Button>
      </div>
    </form>
  );
}
