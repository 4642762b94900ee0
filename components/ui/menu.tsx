"use client";

import { ChevronDown } from "lucide-react";
import Link from "next/link";
import { type KeyboardEvent, type ReactNode, useEffect, useId, useRef, useState } from "react";
import { type ButtonSize, type ButtonTone, buttonStyle } from "./button-style";

export type MenuItem = {
  readonly key: string;
  readonly label: ReactNode;
  /** A destination, or an act. */
  readonly href?: string;
  readonly onSelect?: () => void;
  /** Makes it one of a set of choices, told by a mark and to screen readers. */
  readonly checked?: boolean;
  /** A thin rule above. */
  readonly ruled?: boolean;
};

type MenuProps = Readonly<{
  label: ReactNode;
  ariaLabel?: string;
  items: readonly MenuItem[];
  tone?: ButtonTone;
  size?: ButtonSize;
  align?: "start" | "end";
}>;

const ITEM =
  "flex min-h-9 w-full items-center gap-2 px-3.5 text-left text-table no-underline hover:bg-paper focus-visible:-outline-offset-2";

/** A button that opens a short list of acts; arrows, Home, End, Escape and Tab behave as in a desktop menu. */
export function Menu({ label, ariaLabel, items, tone, size, align = "start" }: MenuProps) {
  const [open, setOpen] = useState(false);
  const root = useRef<HTMLDivElement>(null);
  const button = useRef<HTMLButtonElement>(null);
  const id = useId();
  const entries = () => [...(root.current?.querySelectorAll<HTMLElement>("[role^=menuitem]") ?? [])];

  useEffect(() => {
    if (!open) return;
    root.current?.querySelector<HTMLElement>("[role^=menuitem]")?.focus();
    const outside = (event: PointerEvent) => !root.current?.contains(event.target as Node) && setOpen(false);
    document.addEventListener("pointerdown", outside);
    return () => document.removeEventListener("pointerdown", outside);
  }, [open]);

  const close = () => {
    setOpen(false);
    button.current?.focus();
  };
  const move = (event: KeyboardEvent) => {
    const all = entries();
    const at = all.indexOf(document.activeElement as HTMLElement);
    const targets: Record<string, number> = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: all.length - 1 };
    if (event.key === "Escape") close();
    if (event.key === "Tab") setOpen(false);
    if (!(event.key in targets)) return;
    event.preventDefault();
    all[(targets[event.key] + all.length) % all.length]?.focus();
  };

  return (
    <div ref={root} className="relative inline-block">
      <button
        ref={button}
        type="button"
        aria-haspopup="menu"
        aria-expanded={open}
        aria-controls={open ? id : undefined}
        aria-label={ariaLabel}
        onClick={() => setOpen(!open)}
        onKeyDown={(event) => {
          if (event.key !== "ArrowDown") return;
          event.preventDefault();
          setOpen(true);
        }}
        className={buttonStyle(tone, size)}
      >
        {label}
        <ChevronDown aria-hidden size={15} />
      </button>
      {open ? (
        <div
          id={id}
          role="menu"
          tabIndex={-1}
          aria-label={ariaLabel}
          onKeyDown={move}
          className={`absolute top-full z-40 mt-1 min-w-48 rounded-md border border-ink bg-sheet py-1 ${align === "end" ? "right-0" : "left-0"}`}
        >
          {items.map((item) => (
            <MenuEntry key={item.key} item={item} onDone={close} />
          ))}
        </div>
      ) : null}
    </div>
  );
}

function MenuEntry({ item, onDone }: Readonly<{ item: MenuItem; onDone: () => void }>) {
  const style = item.ruled ? `${ITEM} mt-1 border-t border-rule` : ITEM;
  if (item.href !== undefined) {
    return (
      <Link role="menuitem" tabIndex={-1} href={item.href} className={style} onClick={onDone}>
        {item.label}
      </Link>
    );
  }
  const select = () => {
    onDone();
    item.onSelect?.();
  };
  if (item.checked === undefined) {
    return (
      <button type="button" tabIndex={-1} role="menuitem" className={style} onClick={select}>
        {item.label}
      </button>
    );
  }
  return (
    <button type="button" tabIndex={-1} role="menuitemradio" aria-checked={item.checked} className={style} onClick={select}>
      <span aria-hidden="true" className={`size-2 rounded-full border border-ink ${item.checked ? "bg-ink" : ""}`} />
      {item.label}
    </button>
  );
}
