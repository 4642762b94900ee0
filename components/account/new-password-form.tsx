"use client";

import { useState } from "react";
import { resetPassword } from "@/lib/client/account";
import { LinkButton } from "../ui/link-button";
import { Notice } from "../ui/notice";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { PasswordField } from "./password-field";

const FIELDS = { "/password": "new-password" };

export function NewPasswordForm({ secret }: Readonly<{ secret: string }>) {
  const [changed, setChanged] = useState(false);
  const submit = useSubmit(FIELDS);

  async function change(typed: (name: string) => string) {
    if (await submit.run(() => resetPassword(secret, typed("password")))) setChanged(true);
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
    <AccountForm
      submit={submit}
      refused="The password was not changed."
      label="Save the new password"
      busyLabel="Saving…"
      tone="primary"
      onSend={change}
    >
      {submit.refusal?.at("/secret").length ? (
        <div>
          <LinkButton href="/forgotten-password">Ask for a new link</LinkButton>
        </div>
      ) : null}
      <PasswordField
        id={FIELDS["/password"]}
        label="New password"
        kind="new"
        hint="You are signed out everywhere."
        problem={submit.at("/password")}
      />
    </AccountForm>
  );
}
