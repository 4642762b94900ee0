"use client";

import { type FormEvent, useState } from "react";
import { changePassword } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { Notice } from "../ui/notice";
import { useSubmit } from "../ui/use-submit";
import { PasswordField } from "./password-field";

const FIELDS = { "/currentPassword": "present-password", "/newPassword": "changed-password" };

export function PasswordForm() {
  const { email, resume } = usePerson();
  const [changed, setChanged] = useState(false);
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = event.currentTarget;
    const typed = new FormData(form);
    const body = { currentPassword: String(typed.get("currentPassword")), newPassword: String(typed.get("newPassword")) };
    setChanged(false);
    if (!(await run(() => resume(() => changePassword(body))))) return;
    form.reset();
    setChanged(true);
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex max-w-md flex-col gap-4">
      <FormProblems title="The password was not changed." {...{ attempt, problems }} />
      {changed ? (
        <Notice kind="met" title="The password is changed." role="status">
          Every other session of yours was ended, and a mail about it is on its way to you.
        </Notice>
      ) : null}
      {/* Tells a password manager whose password this is. */}
      <input type="email" name="username" autoComplete="username" value={email} readOnly hidden />
      <PasswordField
        id={FIELDS["/currentPassword"]}
        name="currentPassword"
        label="Present password"
        autoComplete="current-password"
        problem={at("/currentPassword")}
      />
      <PasswordField
        id={FIELDS["/newPassword"]}
        name="newPassword"
        label="New password"
        autoComplete="new-password"
        problem={at("/newPassword")}
      />
      <div>
        <Button type="submit" busy={busy}>
          {busy ? "Changing…" : "Change the password"}
        </Button>
      </div>
    </form>
  );
}
