"use client";

import { useEffect, useRef } from "react";

/** Ctrl+Enter (or Cmd+Enter) solves from anywhere on the page; a cell that is being typed into is finished first. */
export function useSolveKey(solve: () => void, active: boolean) {
  const latest = useRef(solve);
  latest.current = solve;
  useEffect(() => {
    if (!active) return;
    const press = (event: KeyboardEvent) => {
      if (event.key !== "Enter" || !(event.ctrlKey || event.metaKey) || event.altKey) return;
      const focused = document.activeElement;
      if (focused?.closest("dialog")) return;
      event.preventDefault();
      event.stopPropagation();
      const cell = focused instanceof HTMLInputElement ? focused.closest<HTMLElement>("td") : null;
      if (cell) cell.focus();
      // One frame on, so that what leaving the cell changed is what is solved.
      requestAnimationFrame(() => latest.current());
    };
    document.addEventListener("keydown", press, { capture: true });
    return () => document.removeEventListener("keydown", press, { capture: true });
  }, [active]);
}
