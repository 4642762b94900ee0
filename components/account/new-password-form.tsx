"use client";

import { type FormEvent, useState } from "react";
import { resetPassword } from "@/lib/client/account";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { LinkButton } from "../ui/link-button";
import { Notice } from "../ui/notice";
import { useSubmit } from "../ui/use-submit";
import { PasswordField } from "./password-field";

const FIELDS = { "/password": "new-password" };

export function NewPasswordForm({ secret }: Readonly<{ secret: string }>) {
  const [changed, setChanged] = useState(false);
  const { busy, attempt, problems, refusal, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const password = String(new FormData(event.currentTarget).get("password"));
    if (await run(() => resetPassword(secret, password))) setChanged(true);
  }

  if (changed) {
    return (
      <Notice
        kind="met"
        title="Your password is changed."
        role="status"
        action={
          <LinkButton tone="primary" href="/sign-in">
            Sign in
          </LinkButton>
        }
      >
        All your sessions were ended: sign in with the new one.
      </Notice>
    );
  }
  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="The password was not changed." {...{ attempt, problems }} />
      {refusal?.at("/secret").length ? (
        <div>
          <LinkButton href="/forgotten-password">Ask for a new link</LinkButton>
        </div>
      ) : null}
      <PasswordField
        id={FIELDS["/password"]}
        name="password"
        label="New password"
        autoComplete="new-password"
        hint="You are signed out everywhere."
        problem={at("/password")}
      />
      <div>
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Saving…" : "Save the new password"}
        </Button>
      </div>
    </form>
  );
}
