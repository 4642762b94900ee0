"use client";

import Link from "next/link";
import { type DemoAccount, DemoDoor } from "../front-door/demo-door";
import { Notice } from "../ui/notice";
import { SignInForm } from "./sign-in-form";
import { VisitorPage } from "./visitor-page";

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
            <ul className="mt-2 space-y-1.5">
              {demo.accounts.map((account) => (
                <li key={account.email} className="flex flex-wrap items-center justify-between gap-x-3 gap-y-1">
                  <code className="text-xs break-all">{account.email}</code>
                  <DemoDoor
                    account={account}
                    password={demo.password}
                    label={`Enter as ${account.role}`}
                    next={next}
                    size="small"
                  />
                </li>
              ))}
            </ul>
          </Notice>
        </div>
      ) : null}
    </VisitorPage>
  );
}
