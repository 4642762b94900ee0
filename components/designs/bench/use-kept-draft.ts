"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import { keepDraft, type RecipeDraft, readDraft } from "./draft-store";

const KEEP_AFTER_MS = 400;

export type Unsaved = Omit<RecipeDraft, "version" | "at">;
export type Keeping = "nothing" | "keeping" | "kept" | "not kept";

type KeptDraft = Readonly<{
  key: string;
  /** What is on the page and not saved; null once everything is. */
  unsaved: Unsaved | null;
  /** Called once, with what an earlier visit left. */
  onFound: (draft: RecipeDraft) => void;
}>;

const store = (key: string, unsaved: Unsaved | null) =>
  keepDraft(key, unsaved && { ...unsaved, version: 1, at: new Date().toISOString() });

/** Keeps unsaved work in the browser's storage and brings it back: a reload, a killed tab or an ended session costs nothing. */
export function useKeptDraft({ key, unsaved, onFound }: KeptDraft) {
  const [keeping, setKeeping] = useState<Keeping>("nothing");
  const latest = useRef({ unsaved, onFound, touched: false, looked: "" });
  latest.current.unsaved = unsaved;
  latest.current.onFound = onFound;

  useEffect(() => {
    if (latest.current.looked === key) return;
    latest.current.looked = key;
    const draft = readDraft(key);
    if (draft) latest.current.onFound(draft);
  }, [key]);

  useEffect(() => {
    if (!unsaved) {
      setKeeping("nothing");
      if (latest.current.touched) store(key, null);
      return;
    }
    latest.current.touched = true;
    setKeeping("keeping");
    const timer = window.setTimeout(() => setKeeping(store(key, unsaved) ? "kept" : "not kept"), KEEP_AFTER_MS);
    return () => window.clearTimeout(timer);
  }, [key, unsaved]);

  useEffect(() => {
    const flush = () => {
      if (latest.current.unsaved && latest.current.touched) store(key, latest.current.unsaved);
    };
    const warn = (event: BeforeUnloadEvent) => {
      flush();
      if (latest.current.unsaved && latest.current.touched) event.preventDefault();
    };
    window.addEventListener("pagehide", flush);
    window.addEventListener("beforeunload", warn);
    return () => {
      flush();
      window.removeEventListener("pagehide", flush);
      window.removeEventListener("beforeunload", warn);
    };
  }, [key]);

  /** Before the page is left because the work is stored elsewhere now. */
  const forget = useCallback(() => {
    latest.current.touched = false;
    store(key, null);
  }, [key]);
  return { keeping, forget };
}
