"use client";

import { Button } from "../ui/button";
import { useSignOut } from "./use-sign-out";

/** For a page that is meant for somebody else than who is signed in: signs out and comes back to it. */
export function SignOutFirst({ path }: Readonly<{ path: string }>) {
  const leave = useSignOut(path);
  return <Button onClick={leave}>Sign out and come back here</Button>;
}
