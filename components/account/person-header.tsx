"use client";

import { AccountMenu } from "../ui/account-menu";
import { SiteHeader } from "../ui/site-header";
import { useSignOut } from "./use-sign-out";

/** For somebody signed in who belongs to no team: there is nothing to go to but the own account. */
export function PersonHeader({ person }: Readonly<{ person: string }>) {
  const leave = useSignOut();
  return (
    <SiteHeader
      signedIn={false}
      account={<AccountMenu label={person} ariaLabel={`${person}, no team: account menu`} onSignOut={leave} />}
    />
  );
}
