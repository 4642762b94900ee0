import type { Metadata } from "next";
import { SignUpForm } from "@/components/account/sign-up-form";
import { VisitorPage } from "@/components/account/visitor-page";
import { LinkButton } from "@/components/ui/link-button";
import { Notice } from "@/components/ui/notice";
import { currentPerson } from "@/lib/auth/session";

export const metadata: Metadata = { title: "Start a team" };

export default async function Page() {
  const person = await currentPerson();
  return (
    <VisitorPage title="Start a team" person={person?.name}>
      {person ? (
        <Notice
          kind="caution"
          title={`You are signed in as ${person.email}.`}
          action={
            <LinkButton tone="primary" href="/account">
              Go to your account
            </LinkButton>
          }
        >
          You need no second account: a further team is started from the one you have.
        </Notice>
      ) : (
        <>
          <p className="mb-4 text-soft">You become its lead and can invite engineers and reviewers by mail.</p>
          <SignUpForm />
        </>
      )}
    </VisitorPage>
  );
}
