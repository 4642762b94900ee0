"use client";

import { usePathname } from "next/navigation";
import { signOut } from "@/lib/client/session";
import { AccountMenu } from "../ui/account-menu";
import { SiteHeader, type SiteSection } from "../ui/site-header";

const SECTIONS: readonly SiteSection[] = ["plants", "templates", "team"];

type TeamHeaderProps = Readonly<{ team: string; role: string; person: string; showsOutbox: boolean }>;

export function TeamHeader({ team, role, person, showsOutbox }: TeamHeaderProps) {
  const first = usePathname().split("/")[1];
  const leave = async () => {
    await signOut();
    // A full load: nothing of this session may stay in the page's memory.
    window.location.assign("/sign-in");
  };
  return (
    <SiteHeader
      current={SECTIONS.find((section) => section === first) ?? null}
      account={
        <AccountMenu
          {...{ team, role, person }}
          onSignOut={leave}
          extra={showsOutbox ? [{ key: "outbox", label: "Mail of the demonstration", href: "/outbox" }] : []}
        />
      }
    />
  );
}
