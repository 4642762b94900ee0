"use client";

import { useEffect, useRef, useState } from "react";
import type { PlantContent } from "@/lib/schemas/plant";
import { useHistory } from "../../matrix/use-history";

/** What an edit started from: the version of the plant, and its newest revision then. Null for a plant that is not stored yet. */
type From = { readonly version: number | null; readonly revisionId: string | null };
type Kept = Omit<From, "revisionId"> & {
  readonly content: PlantContent;
  readonly name: string;
  /** An earlier release kept none. */
  readonly revisionId?: string | null;
  readonly at: string;
};

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

type Start = From & { readonly content: PlantContent; readonly name: string };

/**
 * The plant being edited with its undo history, kept in the browser's storage until it is saved, so that a reload, a killed
 * tab or an ended session costs nothing. `version` and `revisionId` are what the edit started from and go with the draft.
 */
export function usePlantDraft(key: string, start: Start) {
  const history = useHistory(start.content);
  const [name, setName] = useState(start.name);
  const [version, setVersion] = useState(start.version);
  const [revisionId, setRevisionId] = useState(start.revisionId);
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
    setRevisionId(kept.revisionId ?? null);
    setRestoredAt(kept.at);
  }, [key, set]);

  useEffect(() => {
    if (!ready.current || !dirty) return;
    const now = () => letGo.current || keep(key, { content: present, name, version, revisionId, at: new Date().toISOString() });
    const timer = setTimeout(now, SAVE_AFTER_MS);
    window.addEventListener("pagehide", now);
    return () => {
      clearTimeout(timer);
      window.removeEventListener("pagehide", now);
    };
  }, [key, present, name, version, revisionId, dirty]);

  useEffect(() => {
    if (!dirty) return;
    letGo.current = false;
    const warn = (event: BeforeUnloadEvent) => letGo.current || event.preventDefault();
    window.addEventListener("beforeunload", warn);
    return () => window.removeEventListener("beforeunload", warn);
  }, [dirty]);

  /** After a save, or to drop the changes: what the server keeps is the plant again. */
  function settle(content: PlantContent, from: From, named = name) {
    keep(key, null);
    letGo.current = true;
    setRestoredAt(null);
    setSaved({ content, name: named });
    setName(named);
    setVersion(from.version);
    setRevisionId(from.revisionId);
    if (content !== present) reset(content);
  }

  return {
    ...history,
    content: present,
    name,
    setName,
    version,
    revisionId,
    dirty,
    restoredAt,
    dismissRestored: () => setRestoredAt(null),
    /** The same content now starts from a newer version. */
    rebase: setVersion,
    settle,
    discard: () => settle(saved.content, start, saved.name),
  };
}
export type PlantDraft = ReturnType<typeof usePlantDraft>;
