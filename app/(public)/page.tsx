import type { Metadata } from "next";
import Link from "next/link";
import { DemoDoor } from "@/components/front-door/demo-door";
import { FrontDoor } from "@/components/front-door/front-door";
import { ShownSheet } from "@/components/front-door/shown-sheet";
import { LinkButton } from "@/components/ui/link-button";
import { SiteFooter } from "@/components/ui/site-footer";
import { SiteHeader } from "@/components/ui/site-header";
import { currentContext, currentPerson } from "@/lib/auth/session";
import { demoSignIn } from "@/lib/services/account/demo-sign-in";
import { shownDesign } from "@/lib/services/front-door/shown-design";

export const metadata: Metadata = { title: { absolute: "Gainwright: state feedback for coupled machines" } };

export default async function Page() {
  const [ctx, person] = [await currentContext(), await currentPerson()];
  return (
    <>
      <SiteHeader
        signedIn={ctx !== null}
        account={person ? <Link href="/account">{person.name}</Link> : <Link href="/sign-in">Sign in</Link>}
      />
      <FrontDoor entrance={person ? <WayOn inTeam={ctx !== null} /> : <WaysIn />} sheet={<ShownSheet {...shownDesign()} />} />
      <SiteFooter />
    </>
  );
}

function WayOn({ inTeam }: Readonly<{ inTeam: boolean }>) {
  return (
    <LinkButton tone="primary" href={inTeam ? "/plants" : "/account"}>
      {inTeam ? "Go to your plants" : "Go to your account"}
    </LinkButton>
  );
}

function WaysIn() {
  const demo = demoSignIn();
  const lead = demo?.accounts.find(({ role }) => role === "lead");
  return (
    <>
      <LinkButton tone="primary" href="/sign-in">
        Sign in
      </LinkButton>
      <LinkButton href="/sign-up">Start a team</LinkButton>
      {demo && lead ? <DemoDoor account={lead} password={demo.password} label="Try the demo team" /> : null}
    </>
  );
}
