"use client";

import { useState } from "react";
import { changePassword } from "@/lib/client/account";
import { usePerson } from "../providers/session-provider";
import { Notice } from "../ui/notice";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { PasswordField } from "./password-field";

const FIELDS = { "/currentPassword": "present-password", "/newPassword": "changed-password" };

export function PasswordForm() {
  const { email, resume } = usePerson();
  const [changed, setChanged] = useState(false);
  const submit = useSubmit(FIELDS);

  async function change(typed: (name: string) => string, form: HTMLFormElement) {
    const body = { currentPassword: typed("currentPassword"), newPassword: typed("newPassword") };
    setChanged(false);
    if (!(await submit.run(() => resume(() => changePassword(body))))) return;
    form.reset();
    setChanged(true);
  }

  return (
    <AccountForm
      submit={submit}
      refused="The password was not changed."
      label="Change the password"
      busyLabel="Changing…"
      className="max-w-md"
      onSend={change}
    >
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
        kind="current"
        problem={submit.at("/currentPassword")}
      />
      <PasswordField
        id={FIELDS["/newPassword"]}
        name="newPassword"
        label="New password"
        kind="new"
        problem={submit.at("/newPassword")}
      />
    </AccountForm>
  );
}
