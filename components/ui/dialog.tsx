"use client";

import { X } from "lucide-react";
import { type ReactNode, useEffect, useId, useRef } from "react";
import { Button } from "./button";

type DialogProps = Readonly<{
  open: boolean;
  /** Escape, the cross, or a press outside. */
  onClose: () => void;
  title: ReactNode;
  /** Buttons, the main act last. */
  actions?: ReactNode;
  wide?: boolean;
  children: ReactNode;
}>;

/** Where a dialog asks for something, work starts there and not at the cross; a box to tick is no question. */
const FIRST_FIELD = "input:not([readonly], [hidden], [type=checkbox]), select, textarea";

/** The browser's modal dialog: keeps focus inside, gives it back, and hides the rest from screen readers. */
export function Dialog({ open, onClose, title, actions, wide, children }: DialogProps) {
  const element = useRef<HTMLDialogElement>(null);
  const titleId = useId();
  useEffect(() => {
    const dialog = element.current;
    if (!dialog) return;
    if (open && !dialog.open) {
      dialog.showModal();
      dialog.querySelector<HTMLElement>(FIRST_FIELD)?.focus();
    }
    if (!open && dialog.open) dialog.close();
  }, [open]);
  return (
    <dialog
      ref={element}
      aria-labelledby={titleId}
      onClose={onClose}
      onPointerDown={(event) => event.target === element.current && element.current.close()}
      className={`m-auto max-h-[calc(100dvh-2rem)] w-[calc(100vw-2rem)] overflow-auto rounded-md border border-ink bg-sheet p-0 text-ink backdrop:bg-[rgb(20_24_26/0.55)] ${wide ? "max-w-4xl" : "max-w-lg"}`}
    >
      {open ? (
        <div className="p-5">
          <div className="mb-3 flex items-start gap-4">
            <h2 id={titleId} className="flex-1 text-lg">
              {title}
            </h2>
            <Button size="small" tone="quiet" aria-label="Close" onClick={() => element.current?.close()}>
              <X aria-hidden size={18} />
            </Button>
          </div>
          {children}
          {actions ? <div className="mt-5 flex flex-wrap justify-end gap-3">{actions}</div> : null}
        </div>
      ) : null}
    </dialog>
  );
}
