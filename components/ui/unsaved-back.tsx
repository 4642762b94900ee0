"use client";

import type { ReactNode } from "react";
import { Button } from "./button";
import { Notice } from "./notice";
import { whenText } from "./when-text";

type UnsavedBackProps = Readonly<{
  /** When the work was kept. */
  at: string;
  where?: "browser" | "server";
  onKeep: () => void;
  onDiscard: () => void;
  /** What else to know before going on. */
  children?: ReactNode;
}>;

/**
 * Says that unsaved work came back. The browser finds it after the page is drawn, so it lies over the page's foot and moves
 * nothing; `globals.css` keeps what is focused, and the end of the page, clear of it.
 */
export function UnsavedBack({ at, where = "browser", onKeep, onDiscard, children }: UnsavedBackProps) {
  return (
    <div data-over-foot="" className="no-print fixed inset-x-0 bottom-0 z-40 px-4 pb-4">
      <div className="mx-auto max-w-3xl border border-ink bg-sheet shadow-[0_2px_0_var(--ink)]">
        <Notice
          kind="caution"
          role="status"
          title="Your unsaved changes are back."
          action={
            <>
              <Button size="small" onClick={onKeep}>
                Go on with them
              </Button>
              <Button size="small" tone="grave" onClick={onDiscard}>
                Discard them
              </Button>
            </>
          }
        >
          They were kept {where === "browser" ? "in this browser" : "as your draft"} on {whenText(at)}.{children}
        </Notice>
      </div>
    </div>
  );
}
