"use client";

import { useState } from "react";
import { advance, type History, startHistory, stepBack, stepForward } from "./history";

/** Undo and redo for a whole document, when several grids and a resize are one step. Pass `undo` and `redo` on to each `MatrixGrid`. */
export function useHistory<T>(initial: T) {
  const [history, setHistory] = useState<History<T>>(() => startHistory(initial));
  return {
    present: history.present,
    set: (next: T | ((present: T) => T)) =>
      setHistory((now) => advance(now, typeof next === "function" ? (next as (present: T) => T)(now.present) : next)),
    /** Starts over, for example from what the server keeps. */
    reset: (start: T) => setHistory(startHistory(start)),
    undo: () => setHistory(stepBack),
    redo: () => setHistory(stepForward),
    canUndo: history.past.length > 0,
    canRedo: history.future.length > 0,
  };
}
