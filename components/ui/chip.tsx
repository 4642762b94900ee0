import type { ReactNode } from "react";
import { type StateKind, StateMark } from "./state-mark";

/** A short state beside a heading or in a table: "Revision 4", "accepted". The word says it; `kind` only adds the mark. */
export function Chip({ kind, children }: Readonly<{ kind?: StateKind; children: ReactNode }>) {
  return (
    <span className="inline-flex items-center gap-1.5 rounded-sm border border-rule bg-sheet px-2 py-0.5 text-xs whitespace-nowrap text-soft">
      {kind ? <StateMark kind={kind} /> : null}
      {children}
    </span>
  );
}
