import type { Metadata } from "next";
import { FirstTemplate } from "@/components/templates/first-template";
import { TemplatesTable } from "@/components/templates/templates-table";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { pageContext } from "@/lib/auth/session";
import { isAllowed } from "@/lib/permissions/allow";

export const metadata: Metadata = { title: "Templates" };

export default async function Page() {
  const ctx = await pageContext("/templates");
  return (
    <PageBody>
      <PageHeading title="Templates" />
      <TemplatesTable firstTemplate={<FirstTemplate mayPublish={isAllowed(ctx, "template:publish")} />} />
    </PageBody>
  );
}
