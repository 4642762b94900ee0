import type { ReactNode } from "react";
import { joinClasses } from "./join-classes";
import { STATE_WORD, type StateKind, StateMark } from "./state-mark";

const FRAME: Readonly<Record<StateKind, string>> = {
  met: "bg-met border-met-mark",
  caution: "bg-caution border-caution-mark",
  unmet: "bg-unmet border-unmet-mark",
};

type NoticeProps = Readonly<{
  kind: StateKind;
  /** A sentence in bold that tells the state by itself: "Every mode can be steered." */
  title: string;
  /** Announce it when it appears: `alert` for what stops the work, `status` otherwise. */
  role?: "alert" | "status";
  action?: ReactNode;
  children?: ReactNode;
}>;

/** Told by mark and word first; the tint only helps the eye. */
export function Notice({ kind, title, role, action, children }: NoticeProps) {
  return (
    <div role={role} className={joinClasses("flex gap-2.5 border-l-4 px-3.5 py-2", FRAME[kind])}>
      <span className="flex h-[1.5em] items-center">
        <StateMark kind={kind} word={`${STATE_WORD[kind]}: `} />
      </span>
      <div className="min-w-0 flex-1">
        <strong className="font-semibold">{title}</strong> {children}
        {action ? <div className="no-print mt-2 flex flex-wrap gap-2">{action}</div> : null}
      </div>
    </div>
  );
}
