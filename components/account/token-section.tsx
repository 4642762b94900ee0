"use client";

import { lazy, Suspense } from "react";
import { LoadingState } from "../ui/loading-state";

const AccessTokens = lazy(() => import("./access-tokens").then((module) => ({ default: module.AccessTokens })));

/** Comes after the rest of the account, since few come for it. */
export function TokenSection({ team }: Readonly<{ team: string }>) {
  return (
    <Suspense fallback={<LoadingState label="Loading your access tokens" lines={6} />}>
      <AccessTokens team={team} />
    </Suspense>
  );
}
