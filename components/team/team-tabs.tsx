"use client";

import dynamic from "next/dynamic";
import { LoadingState } from "../ui/loading-state";
import { SheetSection } from "../ui/sheet-section";
import { UrlTabs } from "../ui/url-tabs";
import { MembersSection } from "./members-section";
import { ROLES } from "./role-words";

/** Only leads meet it. */
const InvitationsSection = dynamic(() => import("./invitations-section").then((module) => module.InvitationsSection), {
  loading: () => <LoadingState label="Loading the invitations" lines={3} />,
});
const AuditTrail = dynamic(() => import("./audit-trail").then((module) => module.AuditTrail), {
  loading: () => <LoadingState label="Loading the audit trail" lines={8} />,
});

type TeamTabsProps = Readonly<{ team: string; mayManage: boolean; showsOutbox: boolean }>;

export function TeamTabs({ team, mayManage, showsOutbox }: TeamTabsProps) {
  const people = (
    <>
      <SheetSection title="Members" note={mayManage ? undefined : "a lead of the team changes roles and invites"}>
        <MembersSection team={team} mayManage={mayManage} />
      </SheetSection>
      {mayManage ? (
        <SheetSection title="Invitations" note="by mail, with a link that works once and for seven days">
          <InvitationsSection showsOutbox={showsOutbox} />
        </SheetSection>
      ) : null}
      <SheetSection title="Roles">
        <dl className="grid max-w-prose grid-cols-[auto_1fr] gap-x-4 gap-y-1 text-table">
          {ROLES.map(({ role, may }) => (
            <div key={role} className="contents">
              <dt className="font-semibold">{role}</dt>
              <dd className="text-soft">{may}</dd>
            </div>
          ))}
        </dl>
      </SheetSection>
    </>
  );
  return (
    <UrlTabs
      label="Parts of the team page"
      tabs={[
        { key: "people", label: "People", panel: people },
        { key: "trail", label: "Audit trail", panel: <AuditTrail /> },
      ]}
    />
  );
}
