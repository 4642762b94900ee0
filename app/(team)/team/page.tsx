import type { Metadata } from "next";
import { RenameTeam } from "@/components/team/rename-team";
import { TeamTabs } from "@/components/team/team-tabs";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { pageContext } from "@/lib/auth/session";
import { env } from "@/lib/env";
import { isAllowed } from "@/lib/permissions/allow";
import { readTeam } from "@/lib/services/team/teams";

export const metadata: Metadata = { title: "Team" };

export default async function Page() {
  const ctx = await pageContext("/team");
  const { name } = await readTeam(ctx);
  const mayManage = isAllowed(ctx, "team:manage");
  const showsOutbox = env().GAINWRIGHT_DEMO && isAllowed(ctx, "outbox:read");
  return (
    <PageBody>
      <PageHeading title={name} crumbs={[{ label: "Team" }]} actions={mayManage ? <RenameTeam name={name} /> : null} />
      <TeamTabs team={name} mayManage={mayManage} showsOutbox={showsOutbox} />
    </PageBody>
  );
}
