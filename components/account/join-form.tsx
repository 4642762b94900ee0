"use client";

import { joinByInvitation } from "@/lib/client/account";
import { signIn } from "@/lib/client/session";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { EmailField } from "./email-field";
import { PasswordField } from "./password-field";

const FIELDS = { "/name": "join-name", "/password": "join-password" };

export function JoinForm({ secret, email }: Readonly<{ secret: string; email: string }>) {
  const submit = useSubmit(FIELDS);

  async function join(typed: (name: string) => string) {
    const [name, password] = [typed("name"), typed("password")];
    const done = await submit.run(async () => {
      await joinByInvitation({ secret, name, password });
      await signIn(email, password);
    });
    if (done) window.location.assign("/plants");
  }

  return (
    <AccountForm
      submit={submit}
      refused="You have not joined yet."
      label="Join the team"
      busyLabel="Joining…"
      tone="primary"
      onSend={join}
    >
      <EmailField settled={email} />
      <TextField id={FIELDS["/name"]} name="name" label="Your name" autoComplete="name" problem={submit.at("/name")} />
      <PasswordField id={FIELDS["/password"]} kind="new" problem={submit.at("/password")} />
    </AccountForm>
  );
}
