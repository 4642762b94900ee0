import type { Metadata } from "next";
import { FirstPlant } from "@/components/plants/first-plant";
import { PlantsTable } from "@/components/plants/plants-table";
import { LinkButton } from "@/components/ui/link-button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { pageContext } from "@/lib/auth/session";
import { isAllowed } from "@/lib/permissions/allow";

export const metadata: Metadata = { title: "Plants" };

export default async function Page() {
  const ctx = await pageContext("/plants");
  const mayWrite = isAllowed(ctx, "plant:write");
  return (
    <PageBody>
      <PageHeading
        title="Plants"
        actions={
          mayWrite ? (
            <LinkButton tone="primary" href="/plants/new">
              New plant
            </LinkButton>
          ) : null
        }
      />
      <PlantsTable firstPlant={<FirstPlant mayWrite={mayWrite} />} />
    </PageBody>
  );
}
