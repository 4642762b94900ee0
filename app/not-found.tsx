import type { Metadata } from "next";
import { LinkButton } from "@/components/ui/link-button";
import { PageBody } from "@/components/ui/page-body";
import { PageHeading } from "@/components/ui/page-heading";
import { SiteHeader } from "@/components/ui/site-header";

export const metadata: Metadata = { title: "Not found" };

export default function NotFound() {
  return (
    <>
      <SiteHeader signedIn={false} />
      <PageBody>
        <PageHeading title="Nothing is kept at this address" />
        <p className="mb-5 max-w-[60ch]">
          It may have been removed, or it belongs to a team you are not in. If somebody sent you the link, ask them which team it
          is for.
        </p>
        <LinkButton href="/plants" tone="primary">
          Go to your plants
        </LinkButton>
      </PageBody>
    </>
  );
}
