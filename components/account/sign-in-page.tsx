"use client";

import Link from "next/link";
import { Notice } from "../ui/notice";
import { SignInForm } from "./sign-in-form";
import { VisitorPage } from "./visitor-page";

export type DemoAccount = { readonly email: string; readonly role: string };
type SignInPageProps = Readonly<{
  next: string;
  demo: { readonly accounts: readonly DemoAccount[]; readonly password: string } | null;
}>;

export function SignInPage({ next, demo }: SignInPageProps) {
  return (
    <VisitorPage title="Sign in">
      {/* A full load, so that every part of the page is made for the person who has just signed in. */}
      <SignInForm onSignedIn={() => window.location.assign(next)}>
        <Link href="/forgotten-password">Forgotten your password?</Link>
      </SignInForm>
      <p className="mt-6 border-t border-rule pt-4">
        No account yet? <Link href="/sign-up">Start a team</Link>, or ask a lead of yours for an invitation.
      </p>
      {demo ? (
        <div className="mt-4">
          <Notice kind="caution" title="This is the demonstration.">
            <p className="mt-1">
              Everybody knows these accounts; keep nothing here that matters. Password for all: <code>{demo.password}</code>
            </p>
            <ul className="mt-1">
              {demo.accounts.map(({ email, role }) => (
                <li key={email}>
                  {role}: <code>{email}</code>
                </li>
              ))}
            </ul>
          </Notice>
        </div>
      ) : null}
    </VisitorPage>
  );
}
