import { notFound } from "next/navigation";
import type { ReactNode } from "react";
import { pageContext } from "@/lib/auth/session";
import { env } from "@/lib/env";

/** Decided before anything is sent, so that the status says it too. Outside the demonstration there is no such page. */
export default async function Layout({ children }: Readonly<{ children: ReactNode }>) {
  await pageContext("/outbox");
  if (!env().GAINWRIGHT_DEMO) notFound();
  return children;
}
