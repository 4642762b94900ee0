"use client";

import { useCallback, useRef } from "react";
import { newKey } from "@/lib/client/request";

/** The same key for the same body, so that a create sent again after a lost answer is made once; a changed body gets a new one. */
export function useCreateKey(): (body: unknown) => string {
  const last = useRef<{ readonly text: string; readonly key: string } | null>(null);
  return useCallback((body) => {
    const text = JSON.stringify(body);
    if (last.current?.text !== text) last.current = { text, key: newKey() };
    return last.current.key;
  }, []);
}
