import Link from "next/link";
import type { ReactNode } from "react";
import { SiteHeader } from "@/components/ui/site-header";
import { currentPerson } from "@/lib/auth/session";

/** Documents are open to anybody; whoever is signed in keeps the way back. */
export default async function DocsLayout({ children }: Readonly<{ children: ReactNode }>) {
  const person = await currentPerson();
  const account = person ? <Link href="/account">{person.name}</Link> : <Link href="/sign-in">Sign in</Link>;
  return (
    <>
      <SiteHeader signedIn={person !== null} account={account} />
      {children}
    </>
  );
}
