import Link from "next/link";
import type { ReactNode } from "react";
import { PageBody } from "../ui/page-body";
import { SiteHeader } from "../ui/site-header";

/** A narrow sheet with one form, for somebody who is not signed in. */
export function VisitorPage({ title, children }: Readonly<{ title: string; children: ReactNode }>) {
  return (
    <>
      <SiteHeader
        signedIn={false}
        account={
          <>
            <Link href="/sign-in">Sign in</Link>
            <Link href="/sign-up">Start a team</Link>
          </>
        }
      />
      <PageBody>
        <div className="mx-auto max-w-md border border-rule bg-sheet p-6">
          <h1 className="mb-4 border-b-2 border-ink pb-2 text-title font-bold">{title}</h1>
          {children}
        </div>
      </PageBody>
    </>
  );
}
