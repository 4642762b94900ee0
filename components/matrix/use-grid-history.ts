"use client";

import { useState } from "react";
import { type Entries, sameEntries } from "./grid-edits";
import { advance, type History, startHistory, stepBack, stepForward } from "./history";

export type ChangeReason = "edit" | "paste" | "clear" | "undo" | "redo";
export type OnEntries = (entries: string[][], reason: ChangeReason) => void;

/** History kept by whoever owns the whole document. */
export type OuterHistory = { readonly undo: () => void; readonly redo: () => void };

const copyOut = (entries: Entries): string[][] => entries.map((row) => [...row]);

/** The grid's own history, unless an outer one is given. A change from outside (a resize, a reload) is a step like any other. */
export function useGridHistory(entries: Entries, onChange: OnEntries | undefined, outer: OuterHistory | undefined) {
  const [history, setHistory] = useState<History<Entries>>(() => startHistory(entries));
  if (!outer && !sameEntries(history.present, entries)) setHistory(advance(history, entries));

  const go = (next: History<Entries>, reason: ChangeReason) => {
    if (next === history) return;
    setHistory(next);
    onChange?.(copyOut(next.present), reason);
  };
  return {
    commit: (next: Entries, reason: ChangeReason) => {
      if (sameEntries(next, entries)) return;
      if (outer) onChange?.(copyOut(next), reason);
      else go(advance(history, next), reason);
    },
    undo: outer ? outer.undo : () => go(stepBack(history), "undo"),
    redo: outer ? outer.redo : () => go(stepForward(history), "redo"),
  };
}
