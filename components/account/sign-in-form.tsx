"use client";

import { type FormEvent, type ReactNode, useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { signIn } from "@/lib/client/session";
import { Button } from "../ui/button";
import { FormProblems } from "../ui/form-problems";
import { TextField } from "../ui/text-field";
import { useSubmit } from "../ui/use-submit";
import { PasswordField } from "./password-field";

const FIELDS = { "/email": "sign-in-email", "/password": "sign-in-password" };

type SignInFormProps = Readonly<{
  /** Given where somebody signs in again: the address is shown and fixed. */
  email?: string;
  onSignedIn: () => void;
  children?: ReactNode;
}>;

/** Values stay when it is refused, and password managers and paste work. */
export function SignInForm({ email, onSignedIn, children }: SignInFormProps) {
  const { busy, attempt, problems, at, run } = useSubmit(FIELDS);
  const [signedIn, setSignedIn] = useState(false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const [address, password] = [email ?? String(form.get("email")), String(form.get("password"))];
    const done = await run(async () => {
      requireBoth(address, password);
      await signIn(address, password).catch(atPassword);
    });
    if (!done) return;
    setSignedIn(true);
    onSignedIn();
  }

  return (
    <form method="post" onSubmit={submit} noValidate className="flex flex-col gap-4">
      <FormProblems title="You are not signed in yet." {...{ attempt, problems }} />
      <TextField
        id={FIELDS["/email"]}
        name="email"
        type="email"
        label="E-mail address"
        autoComplete="username"
        defaultValue={email}
        readOnly={email !== undefined}
        problem={at("/email")}
      />
      <PasswordField
        id={FIELDS["/password"]}
        name="password"
        label="Password"
        autoComplete="current-password"
        problem={at("/password")}
      />
      <div className="flex flex-wrap items-center gap-4">
        {/* Stays busy until the next page is there. */}
        <Button type="submit" tone="primary" busy={busy || signedIn}>
          {busy || signedIn ? "Signing in…" : "Sign in"}
        </Button>
        {children}
      </div>
    </form>
  );
}

/** Said here, since an empty field sent would count as a wrong try. @throws RequestProblem */
function requireBoth(address: string, password: string): void {
  const errors = [
    ...(address.trim() === "" ? [{ pointer: "/email", detail: "Write your e-mail address here" }] : []),
    ...(password === "" ? [{ pointer: "/password", detail: "Write your password here" }] : []),
  ];
  if (errors.length === 0) return;
  throw new RequestProblem({ code: "invalid", status: 422, title: "Not complete", detail: "Fill in both fields.", errors });
}

/** A wrong address or password is corrected at the password: which of the two was wrong nobody is told. */
function atPassword(error: unknown): never {
  if (!(error instanceof RequestProblem) || error.status !== 401) throw error;
  const { code, status, title, message: detail } = error;
  throw new RequestProblem({ code, status, title, detail, errors: [{ pointer: "/password", detail }] });
}
