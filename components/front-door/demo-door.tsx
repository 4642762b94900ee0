"use client";

import { useState } from "react";
import { RequestProblem } from "@/lib/client/request";
import { signIn } from "@/lib/client/session";
import { useToast } from "../providers/toast-provider";
import { Button } from "../ui/button";

export type DemoAccount = { readonly email: string; readonly role: string };

type DemoDoorProps = Readonly<{
  account: DemoAccount;
  password: string;
  label: string;
  next?: string;
  tone?: "plain" | "primary";
  size?: "normal" | "small";
}>;

/** Signs in with a published account of the demonstration, whose password everybody may know. */
export function DemoDoor({ account, password, label, next = "/plants", tone, size }: DemoDoorProps) {
  const toast = useToast();
  const [busy, setBusy] = useState(false);
  const enter = async () => {
    setBusy(true);
    try {
      await signIn(account.email, password);
      window.location.assign(next);
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      setBusy(false);
      toast({ kind: "unmet", text: error.message });
    }
  };
  return (
    <Button tone={tone} size={size} busy={busy} onClick={enter}>
      {busy ? "Opening…" : label}
    </Button>
  );
}
