"use client";

import type { FormEvent } from "react";
import { joinByInvitation } from "@/lib/client/account";
import { signIn } from "@/lib/client/session";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { PasswordField } from "./password-field";

const FIELDS = { "/name": "join-name", "/password": "join-password" };

export function JoinForm({ secret, email }: Readonly<{ secret: string; email: string }>) {
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const [name, password] = [String(form.get("name")), String(form.get("password"))];
    const done = await run(async () => {
      await joinByInvitation({ secret, name, password });
      await signIn(email, password);
    });
    if (done) window.location.assign("/plants");
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="You have not joined yet." {...{ attempt, problems }} />
      <TextField label="E-mail address" name="email" type="email" autoComplete="username" value={email} readOnly />
      <TextField id={FIELDS["/name"]} name="name" label="Your name" autoComplete="name" problem={at("/name")} />
      <PasswordField
        id={FIELDS["/password"]}
        name="password"
        label="Password"
        autoComplete="new-password"
        problem={at("/password")}
      />
      <div>
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Joining…" : "Join the team"}
        </Button>
      </div>
    </form>
  );
}
