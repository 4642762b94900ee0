"use client";

import dynamic from "next/dynamic";
import { LoadingState } from "../ui/loading-state";

/** Comes after the rest of the account, since few come for it. */
export const TokenSection = dynamic(() => import("./access-tokens").then((module) => module.AccessTokens), {
  loading: () => <LoadingState label="Loading your access tokens" lines={6} />,
});
