"use client";

import { X } from "lucide-react";
import { createContext, type ReactNode, useCallback, useContext, useRef, useState } from "react";
import { Button } from "../ui/button";
import { type StateKind, StateMark } from "../ui/state-mark";

export type ToastMessage = {
  readonly text: string;
  readonly kind?: StateKind;
  /** For example an undo; the toast then stays at least twelve seconds. */
  readonly action?: { readonly label: string; readonly run: () => void };
};

type Shown = ToastMessage & { readonly id: number };

const ToastContext = createContext<((message: ToastMessage) => void) | null>(null);

const SHOWN_MS = 6_000;
const SHOWN_WITH_ACTION_MS = 12_000;
const MOST_AT_ONCE = 3;

/** Says what has just happened, politely and for a while. Never the only place of an error that must be mended. */
export function useToast() {
  const show = useContext(ToastContext);
  if (!show) throw new Error("useToast needs ToastProvider above it");
  return show;
}

export function ToastProvider({ children }: Readonly<{ children: ReactNode }>) {
  const [shown, setShown] = useState<readonly Shown[]>([]);
  const nextId = useRef(1);
  const timers = useRef(new Map<number, number>());

  const dismiss = useCallback((id: number) => {
    window.clearTimeout(timers.current.get(id));
    timers.current.delete(id);
    setShown((all) => all.filter((toast) => toast.id !== id));
  }, []);

  const startTimer = useCallback(
    (toast: Shown) => {
      window.clearTimeout(timers.current.get(toast.id));
      const stay = toast.action ? SHOWN_WITH_ACTION_MS : SHOWN_MS;
      timers.current.set(
        toast.id,
        window.setTimeout(() => dismiss(toast.id), stay),
      );
    },
    [dismiss],
  );

  const show = useCallback(
    (message: ToastMessage) => {
      const toast = { ...message, id: nextId.current++ };
      setShown((all) => [...all.slice(1 - MOST_AT_ONCE), toast]);
      startTimer(toast);
    },
    [startTimer],
  );

  const pause = (id: number) => window.clearTimeout(timers.current.get(id));
  return (
    <ToastContext value={show}>
      {children}
      <section aria-label="Messages" className="no-print pointer-events-none fixed inset-x-0 bottom-4 z-50 px-4">
        <ul aria-live="polite" className="mx-auto flex max-w-lg flex-col gap-2">
          {shown.map((toast) => (
            <li
              key={toast.id}
              onPointerEnter={() => pause(toast.id)}
              onPointerLeave={() => startTimer(toast)}
              onFocus={() => pause(toast.id)}
              onBlur={() => startTimer(toast)}
              className="pointer-events-auto flex items-center gap-3 rounded-md border border-ink bg-sheet py-2 pr-2 pl-4 text-table shadow-[0_2px_0_var(--ink)]"
            >
              {toast.kind ? <StateMark kind={toast.kind} /> : null}
              <span className="flex-1">{toast.text}</span>
              {toast.action ? (
                <Button
                  size="small"
                  onClick={() => {
                    toast.action?.run();
                    dismiss(toast.id);
                  }}
                >
                  {toast.action.label}
                </Button>
              ) : null}
              <Button size="small" tone="quiet" aria-label="Dismiss this message" onClick={() => dismiss(toast.id)}>
                <X aria-hidden size={16} />
              </Button>
            </li>
          ))}
        </ul>
      </section>
    </ToastContext>
  );
}
