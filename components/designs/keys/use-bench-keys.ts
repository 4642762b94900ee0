"use client";

import { useEffect, useRef } from "react";
import { type BenchAct, benchAct } from "./bench-key";

type Acts = Readonly<Partial<Record<BenchAct, () => void>>>;

const NOT_TEXT = ["range", "checkbox", "radio", "button", "submit", "color", "file"];

function isTyping(target: EventTarget | null): boolean {
  if (target instanceof HTMLInputElement) return !NOT_TEXT.includes(target.type);
  return target instanceof HTMLTextAreaElement || target instanceof HTMLSelectElement;
}

const isUnderDialog = () => document.querySelector("dialog[open]") !== null;

/** Keys that work from anywhere on the page but over a dialog; what is missing in `acts` keeps its usual meaning. */
export function useBenchKeys(acts: Acts): void {
  const latest = useRef(acts);
  latest.current = acts;
  useEffect(() => {
    const actOf = (event: KeyboardEvent) => {
      if (event.defaultPrevented || event.isComposing) return null;
      const { key, shiftKey: shift, altKey: alt, target } = event;
      const act = benchAct({ key, ctrl: event.ctrlKey || event.metaKey, shift, alt, typing: isTyping(target) });
      return act && latest.current[act] ? act : null;
    };
    // Before the grids, in which Enter means something; a cell that is being typed into is finished first.
    const first = (event: KeyboardEvent) => {
      const act = actOf(event);
      if (act !== "solve" && act !== "save") return;
      if (isUnderDialog()) {
        // Nor is the page of the browser what is to be saved then.
        if (act === "save") event.preventDefault();
        return;
      }
      event.preventDefault();
      event.stopPropagation();
      const focused = document.activeElement;
      if (focused instanceof HTMLInputElement) focused.closest<HTMLElement>("td")?.focus();
      // One frame and a task on, so that what was typed last, or what leaving the cell changed, is what is solved or saved.
      requestAnimationFrame(() => setTimeout(() => latest.current[act]?.()));
    };
    // After the grids, which undo by themselves.
    const last = (event: KeyboardEvent) => {
      const act = actOf(event);
      if (!act || isUnderDialog()) return;
      event.preventDefault();
      latest.current[act]?.();
    };
    document.addEventListener("keydown", first, { capture: true });
    document.addEventListener("keydown", last);
    return () => {
      document.removeEventListener("keydown", first, { capture: true });
      document.removeEventListener("keydown", last);
    };
  }, []);
}
