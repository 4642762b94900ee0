"use client";

import { parseAsStringLiteral, useQueryState } from "nuqs";
import { type KeyboardEvent, type ReactNode, useId, useRef, useState } from "react";
import { joinClasses } from "./join-classes";

export type Tab = { readonly key: string; readonly label: ReactNode; readonly count?: number; readonly panel: ReactNode };

type UrlTabsProps = Readonly<{ label: string; tabs: readonly Tab[]; param?: string }>;

/** The open tab lives in the query string. A panel is made when first opened and then only hidden, so nothing typed in it is lost. */
export function UrlTabs({ label, tabs, param = "tab" }: UrlTabsProps) {
  const keys = tabs.map(({ key }) => key);
  const [open, setOpen] = useQueryState(param, parseAsStringLiteral(keys).withDefault(keys[0]));
  const [visited, setVisited] = useState<ReadonlySet<string>>(new Set([open]));
  if (!visited.has(open)) setVisited(new Set([...visited, open]));
  const base = useId();
  const list = useRef<HTMLDivElement>(null);

  const move = (event: KeyboardEvent) => {
    const at = keys.indexOf(open);
    const steps: Record<string, number> = { ArrowRight: at + 1, ArrowLeft: at - 1, Home: 0, End: keys.length - 1 };
    const target = steps[event.key];
    if (target === undefined) return;
    event.preventDefault();
    const next = (target + keys.length) % keys.length;
    void setOpen(keys[next]);
    list.current?.querySelectorAll<HTMLElement>("[role=tab]")[next]?.focus();
  };

  return (
    <>
      <div
        ref={list}
        role="tablist"
        aria-label={label}
        tabIndex={-1}
        onKeyDown={move}
        className="no-print -mt-3 mb-6 flex flex-wrap gap-x-5 border-b border-rule"
      >
        {tabs.map(({ key, label: text, count }) => (
          <button
            key={key}
            type="button"
            role="tab"
            id={`${base}-tab-${key}`}
            aria-selected={key === open}
            aria-controls={`${base}-panel-${key}`}
            tabIndex={key === open ? 0 : -1}
            onClick={() => void setOpen(key)}
            className={joinClasses(
              "-mb-px min-h-10 border-b-3 px-0.5 py-1.5",
              key === open ? "border-ink font-semibold" : "border-transparent text-soft hover:text-ink",
            )}
          >
            {text}
            {count === undefined ? null : <span className="font-normal"> · {count}</span>}
          </button>
        ))}
      </div>
      {tabs.map(({ key, panel }) => (
        <div key={key} role="tabpanel" id={`${base}-panel-${key}`} aria-labelledby={`${base}-tab-${key}`} hidden={key !== open}>
          {visited.has(key) ? panel : null}
        </div>
      ))}
    </>
  );
}
