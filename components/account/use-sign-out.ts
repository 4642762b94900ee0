"use client";

import { RequestProblem } from "@/lib/client/request";
import { signOut } from "@/lib/client/session";
import { useToast } from "../providers/toast-provider";

/** The way out; `next` is where a visitor goes on. A full load: nothing of this session may stay in the page's memory. */
export function useSignOut(next = "/sign-in") {
  const toast = useToast();
  return async () => {
    try {
      await signOut();
      window.location.assign(next);
    } catch (error) {
      if (!(error instanceof RequestProblem)) throw error;
      toast({ kind: "unmet", text: `You are still signed in. ${error.message}` });
    }
  };
}
