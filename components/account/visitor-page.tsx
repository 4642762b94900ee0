import Link from "next/link";
import type { ReactNode } from "react";
import { PageBody } from "../ui/page-body";
import { SiteFooter } from "../ui/site-footer";
import { SiteHeader } from "../ui/site-header";

type VisitorPageProps = Readonly<{
  title: string;
  /** Name of somebody who came here signed in. */
  person?: string;
  children: ReactNode;
}>;

/** A narrow sheet with one form, mostly for somebody who is not signed in. */
export function VisitorPage({ title, person, children }: VisitorPageProps) {
  return (
    <>
      <SiteHeader
        signedIn={false}
        account={
          person ? (
            <Link href="/account">{person}</Link>
          ) : (
            <>
              <Link href="/sign-in">Sign in</Link>
              <Link href="/sign-up">Start a team</Link>
            </>
          )
        }
      />
      <PageBody>
        <div className="mx-auto max-w-md border border-rule bg-sheet p-6">
          <h1 className="mb-4 border-b-2 border-ink pb-2 text-title font-bold break-words">{title}</h1>
          {children}
        </div>
      </PageBody>
      <SiteFooter />
    </>
  );
}
