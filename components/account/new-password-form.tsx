"use client";

import type { FormEvent } from "react";
import { resetPassword } from "@/lib/client/account";
import { PASSWORD_LENGTH } from "@/lib/schemas/password-length";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";

const FIELDS = { "/password": "new-password" };

export function NewPasswordForm({ secret }: Readonly<{ secret: string }>) {
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const password = String(new FormData(event.currentTarget).get("password"));
    if (await run(() => resetPassword(secret, password))) window.location.assign("/sign-in");
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="The password was not changed." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/password"]}
        name="password"
        type="password"
        label="New password"
        autoComplete="new-password"
        hint={`At least ${PASSWORD_LENGTH.least} characters; ${PASSWORD_LENGTH.advised} or more are better. You are signed out everywhere.`}
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
