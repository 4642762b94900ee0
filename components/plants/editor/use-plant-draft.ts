"use client";

import { useEffect, useRef, useState } from "react";
import type { PlantContent } from "@/lib/schemas/plant";
import { useHistory } from "../../matrix/use-history";

type Kept = { readonly content: PlantContent; readonly name: string; readonly version: number | null; readonly at: string };

const SAVE_AFTER_MS = 300;

function readKept(key: string): Kept | null {
  try {
    const text = localStorage.getItem(key);
    return text === null ? null : (JSON.parse(text) as Kept);
  } catch {
    return null; // storage switched off, or another release's draft: the page works without it
  }
}

function keep(key: string, draft: Kept | null): void {
  try {
    if (draft) localStorage.setItem(key, JSON.stringify(draft));
    else localStorage.removeItem(key);
  } catch {
    // Full or switched off: leaving the page still asks first.
  }
}

type Start = { readonly content: PlantContent; readonly name: string; readonly version: number | null };

/**
 * The plant being edited with its undo history, kept in the browser's storage until it is saved, so that a reload, a killed
 * tab or an ended session costs nothing. `version` is what the edit started from and goes with the draft.
 */
export function usePlantDraft(key: string, start: Start) {
  const history = useHistory(start.content);
  const [name, setName] = useState(start.name);
  const [version, setVersion] = useState(start.version);
  const [saved, setSaved] = useState({ content: start.content, name: start.name });
  const [restoredAt, setRestoredAt] = useState<string | null>(null);
  const ready = useRef(false);
  const letGo = useRef(false);
  const { present, set, reset } = history;
  const dirty = present !== saved.content || name !== saved.name;

  useEffect(() => {
    if (ready.current) return;
    ready.current = true;
    const kept = readKept(key);
    if (!kept) return;
    set(kept.content);
    setName(kept.name);
    setVersion(kept.version);
    setRestoredAt(kept.at);
  }, [key, set]);

  useEffect(() => {
    if (!ready.current || !dirty) return;
    const now = () => letGo.current || keep(key, { content: present, name, version, at: new Date().toISOString() });
    const timer = setTimeout(now, SAVE_AFTER_MS);
    window.addEventListener("pagehide", now);
    return () => {
      clearTimeout(timer);
      window.removeEventListener("pagehide", now);
    };
  }, [key, present, name, version, dirty]);

  useEffect(() => {
    if (!dirty) return;
    letGo.current = false;
    const warn = (event: BeforeUnloadEvent) => letGo.current || event.preventDefault();
    window.addEventListener("beforeunload", warn);
    return () => window.removeEventListener("beforeunload", warn);
  }, [dirty]);

  /** After a save, or to drop the changes: what the server keeps is the plant again. */
  function settle(content: PlantContent, atVersion: number | null, named = name) {
    keep(key, null);
    letGo.current = true;
    setRestoredAt(null);
    setSaved({ content, name: named });
    setName(named);
    setVersion(atVersion);
    if (content !== present) reset(content);
  }

  return {
    ...history,
    content: present,
    name,
    setName,
    version,
    dirty,
    restoredAt,
    dismissRestored: () => setRestoredAt(null),
    /** The same content now starts from a newer version. */
    rebase: setVersion,
    settle,
    discard: () => settle(saved.content, start.version, saved.name),
  };
}
export type PlantDraft = ReturnType<typeof usePlantDraft>;
