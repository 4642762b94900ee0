import Link from "next/link";
import type { ReactNode } from "react";
import { SiteFooter } from "@/components/ui/site-footer";
import { SiteHeader } from "@/components/ui/site-header";
import { currentContext, currentPerson } from "@/lib/auth/session";

/** Documents are open to anybody; whoever is signed in keeps the way back. */
export default async function DocsLayout({ children }: Readonly<{ children: ReactNode }>) {
  const [ctx, person] = [await currentContext(), await currentPerson()];
  const account = person ? <Link href="/account">{person.name}</Link> : <Link href="/sign-in">Sign in</Link>;
  return (
    <>
      <SiteHeader signedIn={ctx !== null} account={account} />
      {children}
      <SiteFooter />
    </>
  );
}
