"use client";

import { useCallback, useEffect, useRef, useState } from "react";
import type { DraftSubject } from "@/lib/client/drafts";
import { type AutosaveStatus, NOTHING_TO_SAVE } from "./autosave";
import { DraftKeeper, type OtherDraft } from "./draft-keeper";
import type { RecipeDraft, Unsaved } from "./draft-store";
import { useLocalCopy } from "./use-local-copy";

type KeptDraft = Readonly<{
  /** Of the copy in this browser. */
  key: string;
  subject: DraftSubject;
  /** Whether this person keeps drafts at all. */
  active: boolean;
  /** What is on the page and not saved; null once everything is. */
  unsaved: Unsaved | null;
  /** Whether somebody changed something since the page, or the draft that came back, was shown. */
  edited: boolean;
  /** Called with what another visit, or another page, left. */
  onFound: (draft: RecipeDraft) => void;
}>;

/** Keeps unsaved work in this browser and on the server and brings it back: a reload, a killed tab or a lost connection costs nothing. */
export function useKeptDraft({ key, subject: { plantId, subjectId }, active, ...now }: KeptDraft) {
  const { unsaved } = now;
  const [status, setStatus] = useState(NOTHING_TO_SAVE);
  const [other, setOther] = useState<OtherDraft | null>(null);
  const { kept, note, forget: forgetCopy } = useLocalCopy(key, unsaved);
  const latest = useRef(now);
  latest.current = now;
  const keeper = useRef<DraftKeeper | null>(null);

  useEffect(() => {
    if (!active) return;
    const onStatus = (next: AutosaveStatus) => {
      note(next);
      setStatus(next);
    };
    onStatus(NOTHING_TO_SAVE);
    const opened = new DraftKeeper(
      key,
      { plantId, subjectId },
      {
        now: () => latest.current,
        onFound: (draft) => latest.current.onFound(draft),
        onOther: setOther,
        onStatus,
      },
    );
    keeper.current = opened;
    opened.offer(latest.current.unsaved);
    void opened.open();
    const online = () => opened.tryNow();
    window.addEventListener("online", online);
    return () => {
      window.removeEventListener("online", online);
      keeper.current = null;
      setOther(null);
      opened.close();
    };
  }, [key, plantId, subjectId, active, note]);

  useEffect(() => keeper.current?.offer(unsaved), [unsaved]);

  const decide = useCallback((take: boolean, asked: OtherDraft) => keeper.current?.decide(take, asked), []);
  /** Before the page is left because the work is stored elsewhere now. */
  const forget = useCallback(() => {
    forgetCopy();
    keeper.current?.offer(null);
  }, [forgetCopy]);
  return { drafting: { state: status.state, keptHere: kept, other, decide }, forget };
}

export type Drafting = ReturnType<typeof useKeptDraft>["drafting"];
