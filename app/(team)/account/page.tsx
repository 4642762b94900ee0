import type { Metadata } from "next";
import { InvitationLinkForm } from "@/components/account/invitation-link-form";
import { NameForm } from "@/components/account/name-form";
import { OwnTeams } from "@/components/account/own-teams";
import { PasswordForm } from "@/components/account/password-form";
import { SignOutEverywhere } from "@/components/account/sign-out-everywhere";
import { StartTeamForm } from "@/components/account/start-team-form";
import { TokenSection } from "@/components/account/token-section";
import { Notice } from "@/components/ui/notice";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { SheetSection } from "@/components/ui/sheet-section";
import { currentContext, pagePerson } from "@/lib/auth/session";
import { readProfile } from "@/lib/services/account/read-profile";

export const metadata: Metadata = { title: "Account" };

/** Also for somebody who is in no team now: the way to one is here. */
export default async function Page() {
  const person = await pagePerson("/account");
  const { name, email, teams, currentTeamId } = await readProfile(person, await currentContext());
  const current = teams.find(({ id }) => id === currentTeamId);
  return (
    <PageBody>
      <PageHeading title="Account" />
      {current ? null : (
        <div className="mb-6">
          <Notice kind="caution" title={teams.length === 0 ? "You belong to no team now." : "You work in no team now."}>
            {teams.length === 0
              ? "Start one, or open the link of an invitation: plants and designs live in teams."
              : "Choose the one to work in."}
          </Notice>
        </div>
      )}
      <div className="grid gap-x-16 lg:grid-cols-[minmax(18rem,26rem)_minmax(0,1fr)]">
        <div>
          <SheetSection title="You">
            <NameForm name={name} email={email} />
          </SheetSection>
          <SheetSection title="Password">
            <PasswordForm />
          </SheetSection>
          <SheetSection title="Sessions">
            <SignOutEverywhere />
          </SheetSection>
        </div>
        <div className={current ? undefined : "order-first lg:order-none"}>
          <SheetSection title="Teams">
            {teams.length > 0 ? <OwnTeams teams={teams} currentTeamId={currentTeamId} /> : null}
            <div className="mt-4 grid max-w-3xl gap-6 sm:grid-cols-2">
              <StartTeamForm />
              <InvitationLinkForm />
            </div>
          </SheetSection>
          {current ? (
            <SheetSection title="Access tokens" note={`for ${current.name}`}>
              <TokenSection team={current.name} />
            </SheetSection>
          ) : null}
        </div>
      </div>
    </PageBody>
  );
}
