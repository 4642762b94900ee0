"use client";

import { parseAsString, parseAsStringLiteral, useQueryStates } from "nuqs";

const LOOPS = ["observer", "full-state"] as const;

/** What of the comparison is shown; it lives in the address, so that a colleague sees the same. */
export function useSideBySideView() {
  return useQueryStates(
    {
      hide: parseAsStringLiteral(["equal"] as const),
      commanded: parseAsString,
      loop: parseAsStringLiteral(LOOPS).withDefault("observer"),
      sort: parseAsString,
      order: parseAsStringLiteral(["least", "most"] as const).withDefault("least"),
      gains: parseAsStringLiteral(["entries", "difference"] as const).withDefault("entries"),
    },
    { history: "replace" },
  );
}

export type SideBySideView = ReturnType<typeof useSideBySideView>;
