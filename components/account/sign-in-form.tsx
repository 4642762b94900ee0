"use client";

import { type ReactNode, useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { signIn } from "@/lib/client/session";
import { useSubmit } from "../ui/use-submit";
import { AccountForm } from "./account-form";
import { EmailField } from "./email-field";
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
  const submit = useSubmit(FIELDS);
  const [signedIn, setSignedIn] = useState(false);

  async function enter(typed: (name: string) => string) {
    const [address, password] = [typed("email"), typed("password")];
    const done = await submit.run(async () => {
      requireBoth(address, password);
      await signIn(address, password).catch(atPassword);
    });
    if (!done) return;
    setSignedIn(true);
    onSignedIn();
  }

  return (
    <AccountForm
      submit={submit}
      refused="You are not signed in yet."
      label="Sign in"
      busyLabel="Signing in…"
      // Stays busy until the next page is there.
      busy={submit.busy || signedIn}
      tone="primary"
      beside={children}
      onSend={enter}
    >
      <EmailField id={FIELDS["/email"]} settled={email} problem={submit.at("/email")} />
      <PasswordField id={FIELDS["/password"]} kind="current" problem={submit.at("/password")} />
    </AccountForm>
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
