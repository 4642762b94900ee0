"use client";

import { usePathname } from "next/navigation";
import { AccountMenu } from "../ui/account-menu";
import { SiteHeader, type SiteSection } from "../ui/site-header";
import { useSignOut } from "./use-sign-out";

const SECTIONS: readonly SiteSection[] = ["plants", "templates", "team"];

type TeamHeaderProps = Readonly<{ team: string; role: string; person: string; showsOutbox: boolean }>;

export function TeamHeader({ team, role, person, showsOutbox }: TeamHeaderProps) {
  const first = usePathname().split("/")[1];
  const leave = useSignOut();
  return (
    <SiteHeader
      current={SECTIONS.find((section) => section === first) ?? null}
      account={
        <AccountMenu
          label={`${team} · ${role}`}
          ariaLabel={`${team}, ${role}, ${person}: account menu`}
          onSignOut={leave}
          extra={showsOutbox ? [{ key: "outbox", label: "Mail of the demonstration", href: "/outbox" }] : []}
        />
      }
    />
  );
}
