import type { ReactNode } from "react";
import { pageContext } from "@/lib/auth/session";

/** Asked before anything is sent: a visitor is answered with a redirect, not with a page that holds one. */
export default async function Layout({ children }: Readonly<{ children: ReactNode }>) {
  await pageContext("/team");
  return children;
}
