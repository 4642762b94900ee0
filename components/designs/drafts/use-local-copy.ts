"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import { type AutosaveStatus, NOTHING_TO_SAVE } from "./autosave";
import { keepLocalDraft, type Unsaved } from "./draft-store";

const KEEP_AFTER_MS = 300;

/** The copy of unsaved work in this browser's storage. Leaving asks first only while the work is neither here nor on the server. */
export function useLocalCopy(key: string, unsaved: Unsaved | null) {
  const [kept, setKept] = useState(true);
  // `touched`: under which key something was unsaved on this page. What lies under another one is not this page's to remove.
  const latest = useRef({ unsaved, at: "", touched: "", status: NOTHING_TO_SAVE });
  if (latest.current.unsaved !== unsaved) latest.current.at = new Date().toISOString();
  latest.current.unsaved = unsaved;

  /** Whether nothing would be lost here if the page ended now. */
  const write = useCallback((): boolean => {
    const { unsaved: now, touched, at, status } = latest.current;
    if (!now || touched !== key) return true;
    const done = keepLocalDraft(key, { ...now, at, marks: status.marks, synced: status.synced });
    setKept(done);
    return done;
  }, [key]);

  useEffect(() => {
    if (!unsaved) {
      if (latest.current.touched === key) keepLocalDraft(key, null);
      return;
    }
    latest.current.touched = key;
    const timer = window.setTimeout(write, KEEP_AFTER_MS);
    return () => window.clearTimeout(timer);
  }, [key, unsaved, write]);

  useEffect(() => {
    const warn = (event: BeforeUnloadEvent) => {
      if (!write() && !latest.current.status.synced) event.preventDefault();
    };
    window.addEventListener("pagehide", write);
    window.addEventListener("beforeunload", warn);
    return () => {
      write();
      window.removeEventListener("pagehide", write);
      window.removeEventListener("beforeunload", warn);
    };
  }, [write]);

  /** What is known of the server's copy goes with this one. */
  const note = useCallback(
    (status: AutosaveStatus) => {
      latest.current.status = status;
      write();
    },
    [write],
  );
  const forget = useCallback(() => {
    latest.current.touched = "";
    keepLocalDraft(key, null);
  }, [key]);
  return { kept, note, forget };
}
