"use client";

import { PageFailure, type PageFailureProps } from "@/components/ui/page-failure";

/** Keeps the team's header above a page that failed. */
export default function TeamPageError(props: PageFailureProps) {
  return <PageFailure {...props} />;
}
