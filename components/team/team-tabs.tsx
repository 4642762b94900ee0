"use client";

import { lazy, Suspense } from "react";
import { LoadingState } from "../ui/loading-state";
import { SheetSection } from "../ui/sheet-section";
import { UrlTabs } from "../ui/url-tabs";
import { MembersSection } from "./members-section";
import { ROLES } from "./role-words";

/** Only leads meet it. */
const InvitationsSection = lazy(() => import("./invitations-section").then((module) => ({ default: module.InvitationsSection })));
const AuditTrail = lazy(() => import("./audit-trail").then((module) => ({ default: module.AuditTrail })));

type TeamTabsProps = Readonly<{ team: string; mayManage: boolean; showsOutbox: boolean }>;

export function TeamTabs({ team, mayManage, showsOutbox }: TeamTabsProps) {
  const people = (
    <>
      <SheetSection title="Members" note={mayManage ? undefined : "a lead of the team changes roles and invites"}>
        <MembersSection team={team} mayManage={mayManage} />
      </SheetSection>
      {mayManage ? (
        <SheetSection title="Invitations" note="by mail, with a link that works once and for seven days">
          <Suspense fallback={<LoadingState label="Loading the invitations" lines={3} />}>
            <InvitationsSection showsOutbox={showsOutbox} />
          </Suspense>
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
  const trail = (
    <Suspense fallback={<LoadingState label="Loading the audit trail" lines={8} />}>
      <AuditTrail />
    </Suspense>
  );
  return (
    <UrlTabs
      label="Parts of the team page"
      tabs={[
        { key: "people", label: "People", panel: people },
        { key: "trail", label: "Audit trail", panel: trail },
      ]}
    />
  );
}
