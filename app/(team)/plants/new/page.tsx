import type { Metadata } from "next";
import { NewPlantPage } from "@/components/plants/editor/new-plant-page";
import { ErrorState } from "@/components/ui/error-state";
import { LinkButton } from "@/components/ui/link-button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { pageContext } from "@/lib/auth/session";
import { isAllowed } from "@/lib/permissions/allow";

export const metadata: Metadata = { title: "New plant" };

export default async function Page() {
  const ctx = await pageContext("/plants/new");
  if (isAllowed(ctx, "plant:write")) {
    return (
      <PageBody>
        <NewPlantPage />
      </PageBody>
    );
  }
  return (
    <PageBody>
      <PageHeading title="New plant" crumbs={[{ label: "Plants", href: "/plants" }]} />
      <ErrorState
        title="Reviewers read plants and do not enter them."
        action={<LinkButton href="/plants">Go to the plants</LinkButton>}
      >
        Ask a lead for the role engineer if you are to enter one.
      </ErrorState>
    </PageBody>
  );
}
