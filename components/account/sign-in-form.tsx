"use client";

import { type FormEvent, type ReactNode, useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { signIn } from "@/lib/client/session";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";

type SignInFormProps = Readonly<{
  /** Given where somebody signs in again: the address is shown and fixed. */
  email?: string;
  onSignedIn: () => void;
  children?: ReactNode;
}>;

/** Values stay when it is refused, and password managers and paste work. */
export function SignInForm({ email, onSignedIn, children }: SignInFormProps) {
  const [attempt, setAttempt] = useState(0);
  const [problem, setProblem] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    setBusy(true);
    setProblem(null);
    try {
      await signIn(email ?? String(form.get("email")), String(form.get("password")));
      onSignedIn();
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      setProblem(error.message);
      setAttempt((count) => count + 1);
    } finally {
      setBusy(false);
    }
  }

  return (
    <form method="post" onSubmit={submit} className="flex flex-col gap-4">
      <FormProblems
        title="You are not signed in yet."
        attempt={attempt}
        problems={problem ? [{ fieldId: "sign-in-password", message: problem }] : []}
      />
      <TextField
        id="sign-in-email"
        name="email"
        type="email"
        label="E-mail address"
        autoComplete="username"
        required
        defaultValue={email}
        readOnly={email !== undefined}
      />
      <TextField
        id="sign-in-password"
        name="password"
        type="password"
        label="Password"
        autoComplete="current-password"
        required
      />
      <div className="flex flex-wrap items-center gap-4">
        <Button type="submit" tone="primary" busy={busy}>
          {busy ? "Signing in…" : "Sign in"}
        </Button>
        {children}
      </div>
    </form>
  );
}
