"use client";

import { type CSSProperties, type KeyboardEvent, useEffect, useRef } from "react";
import { EMPTY_ENTRY } from "./grid-edits";
import { afterEntry } from "./grid-keys";

type CellInputProps = Readonly<{
  label: string;
  text: string;
  /** Began by typing over the entry: arrows then finish it, as in a spreadsheet. */
  replacing: boolean;
  onText: (text: string) => void;
  onFinish: (move: readonly [number, number] | null) => void;
  onCancel: () => void;
}>;

export function CellInput({ label, text, replacing, onText, onFinish, onCancel }: CellInputProps) {
  const input = useRef<HTMLInputElement>(null);
  useEffect(() => {
    const element = input.current;
    element?.focus();
    // A zero is written over, anything else is added to.
    const from = element?.value === EMPTY_ENTRY && !replacing ? 0 : (element?.value.length ?? 0);
    element?.setSelectionRange(from, element.value.length);
  }, [replacing]);
  const press = (event: KeyboardEvent) => {
    event.stopPropagation();
    if (event.nativeEvent.isComposing) return;
    if (event.key === "Escape") {
      event.preventDefault();
      onCancel();
      return;
    }
    const move = afterEntry(
      { key: event.key, ctrl: event.ctrlKey || event.metaKey, shift: event.shiftKey, alt: event.altKey },
      replacing,
    );
    if (!move) return;
    event.preventDefault();
    onFinish(move);
  };
  return (
    <input
      ref={input}
      aria-label={label}
      value={text}
      onChange={({ target }) => onText(target.value)}
      onKeyDown={press}
      onBlur={() => onFinish(null)}
      autoComplete="off"
      autoCapitalize="off"
      spellCheck={false}
      style={{ "--length": Math.max(6, text.length + 1) } as CSSProperties}
    />
  );
}
