"use client";

import { signUp } from "@/lib/client/account";
import { signIn } from "@/lib/client/session";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { EmailField } from "./email-field";
import { PasswordField } from "./password-field";

const FIELDS = {
  "/teamName": "sign-up-team",
  "/name": "sign-up-name",
  "/email": "sign-up-email",
  "/password": "sign-up-password",
};

export function SignUpForm() {
  const submit = useSubmit(FIELDS);
  const { at } = submit;

  async function start(typed: (name: string) => string) {
    const account = {
      name: typed("name"),
      email: typed("email"),
      password: typed("password"),
      teamName: typed("teamName"),
    };
    const done = await submit.run(async () => {
      await signUp(account);
      await signIn(account.email, account.password);
    });
    if (done) window.location.assign("/plants");
  }

  return (
    <AccountForm
      submit={submit}
      refused="The team could not be started yet."
      label="Start the team"
      busyLabel="Starting the team…"
      tone="primary"
      onSend={start}
    >
      <TextField
        id={FIELDS["/teamName"]}
        name="teamName"
        label="Name of the team"
        autoComplete="organization"
        problem={at("/teamName")}
      />
      <TextField id={FIELDS["/name"]} name="name" label="Your name" autoComplete="name" problem={at("/name")} />
      <EmailField id={FIELDS["/email"]} problem={at("/email")} />
      <PasswordField id={FIELDS["/password"]} kind="new" hint="Several words do well." problem={at("/password")} />
    </AccountForm>
  );
}
