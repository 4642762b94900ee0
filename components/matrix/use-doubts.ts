"use client";

import { useMemo, useState } from "react";
import type { Entries } from "./grid-edits";
import type { Doubt } from "./grid-paste";
import { cellKey } from "./matrix-head";

/** Adds to the problems found by evaluation those that only the reading of typed or pasted text can know. */
export function useDoubts(entries: Entries, problems: ReadonlyMap<string, string>) {
  const [doubts, setDoubts] = useState<readonly Doubt[]>([]);
  const all = useMemo(() => {
    const standing = doubts.filter(({ r, c, entry }) => entries[r]?.[c] === entry);
    return new Map([...problems, ...standing.map(({ r, c, message }) => [cellKey(r, c), message] as const)]);
  }, [problems, doubts, entries]);
  const add = (found: readonly Doubt[]) => {
    if (found.length > 0) setDoubts((now) => [...now.filter(({ r, c, entry }) => entries[r]?.[c] === entry), ...found]);
  };
  return [all, add] as const;
}
