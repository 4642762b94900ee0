"use client";

import type { FormEvent } from "react";
import { signUp } from "@/lib/client/account";
import { signIn } from "@/lib/client/session";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { PasswordField } from "./password-field";

const FIELDS = {
  "/teamName": "sign-up-team",
  "/name": "sign-up-name",
  "/email": "sign-up-email",
  "/password": "sign-up-password",
};

export function SignUpForm() {
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const field = (name: string) => String(form.get(name));
    const account = { name: field("name"), email: field("email"), password: field("password"), teamName: field("teamName") };
    const done = await run(async () => {
      await signUp(account);
      await signIn(account.email, account.password);
    });
    if (done) window.location.assign("/plants");
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="The team could not be started yet." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/teamName"]}
        name="teamName"
        label="Name of the team"
        autoComplete="organization"
        problem={at("/teamName")}
      />
      <TextField id={FIELDS["/name"]} name="name" label="Your name" autoComplete="name" problem={at("/name")} />
      <TextField
        id={FIELDS["/email"]}
        name="email"
        type="email"
        label="E-mail address"
        autoComplete="username"
        problem={at("/email")}
      />
      <PasswordField
        id={FIELDS["/password"]}
        name="password"
        label="Password"
        autoComplete="new-password"
        hint="Several words do well."
        problem={at("/password")}
      />
      <div>
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Starting the team…" : "Start the team"}
        </Button>
      </div>
    </form>
  );
}
