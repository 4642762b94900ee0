import type { ReactNode } from "react";
import { TeamHeader } from "@/components/account/team-header";
import { SessionProvider } from "@/components/providers/session-provider";
import { currentContext, currentPerson } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { isAllowed } from "@/lib/permissions/allow";
import { readTeam } from "@/lib/services/team/teams";

/** The frame of every page behind the sign-in. It guards nothing: each page asks for its own context. */
export default async function TeamLayout({ children }: Readonly<{ children: ReactNode }>) {
  const [ctx, person] = [await currentContext(), await currentPerson()];
  if (!ctx || !person) return children;
  const { name: team } = await readTeam(ctx);
  const showsOutbox = env().GAINWRIGHT_DEMO && isAllowed(ctx, "outbox:read");
  const facts = { userId: ctx.userId, email: person.email, teamId: ctx.teamId, role: ctx.role };
  return (
    <SessionProvider facts={facts}>
      <TeamHeader team={team} role={ctx.role} person={person.name} showsOutbox={showsOutbox} />
      {children}
    </SessionProvider>
  );
}
