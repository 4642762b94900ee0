import type { ReactNode } from "react";
import { PersonHeader } from "@/components/account/person-header";
import { TeamHeader } from "@/components/account/team-header";
import { SessionProvider } from "@/components/providers/session-provider";
import { SiteFooter } from "@/components/ui/site-footer";
import { currentContext, currentPerson } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { isAllowed } from "@/lib/permissions/allow";
import { readTeam } from "@/lib/services/team/teams";

/** The frame of every page behind the sign-in. It guards nothing: each page asks for its own context. */
export default async function TeamLayout({ children }: Readonly<{ children: ReactNode }>) {
  const [ctx, person] = [await currentContext(), await currentPerson()];
  if (!person) return children;
  const { userId, email } = person;
  if (!ctx) {
    return (
      <SessionProvider facts={{ userId, email }}>
        <PersonHeader person={person.name} />
        {children}
        <SiteFooter />
      </SessionProvider>
    );
  }
  const { name: team } = await readTeam(ctx);
  const showsOutbox = env().GAINWRIGHT_DEMO && isAllowed(ctx, "outbox:read");
  return (
    <SessionProvider facts={{ userId, email, teamId: ctx.teamId, role: ctx.role }}>
      <TeamHeader team={team} role={ctx.role} person={person.name} showsOutbox={showsOutbox} />
      {children}
      <SiteFooter />
    </SessionProvider>
  );
}
