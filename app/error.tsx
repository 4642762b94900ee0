"use client";

import { PageFailure, type PageFailureProps } from "@/components/ui/page-failure";
import { SiteHeader } from "@/components/ui/site-header";

/** Where no part nearer to the page caught it. */
export default function PageError(props: PageFailureProps) {
  return (
    <>
      <SiteHeader signedIn={false} />
      <PageFailure {...props} />
    </>
  );
}
