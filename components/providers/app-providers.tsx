"use client";

import { CSPProvider } from "@base-ui/react/csp-provider";
import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { NuqsAdapter } from "nuqs/adapters/next/app";
import { type ReactNode, useState } from "react";
import { ToastProvider } from "./toast-provider";

const STALE_AFTER_MS = 30_000;

const makeClient = () =>
  new QueryClient({
    defaultOptions: { queries: { staleTime: STALE_AFTER_MS, retry: 1, refetchOnWindowFocus: true }, mutations: { retry: false } },
  });

/** The first nonce is kept: after a navigation in the browser the document still has the old one. */
export function AppProviders({ nonce, children }: Readonly<{ nonce?: string; children: ReactNode }>) {
  const [firstNonce] = useState(nonce);
  const [client] = useState(makeClient);
  return (
    <CSPProvider nonce={firstNonce}>
      <QueryClientProvider client={client}>
        <NuqsAdapter>
          <ToastProvider>{children}</ToastProvider>
        </NuqsAdapter>
      </QueryClientProvider>
    </CSPProvider>
  );
}
