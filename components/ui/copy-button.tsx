"use client";

import { Check, Copy } from "lucide-react";
import { useEffect, useState } from "react";
import { Button } from "./button";

type CopyButtonProps = Readonly<{
  /** Made when pressed, so that a large table costs nothing until then. */
  text: () => string;
  /** "Copy", or what is copied: "Copy gain". */
  label?: string;
  size?: "normal" | "small";
}>;

const SAID_FOR_MS = 3_000;

export function CopyButton({ text, label = "Copy", size = "small" }: CopyButtonProps) {
  const [outcome, setOutcome] = useState<"" | "Copied" | "Not copied: select it and press Ctrl+C">("");
  useEffect(() => {
    if (!outcome) return;
    const timer = window.setTimeout(() => setOutcome(""), SAID_FOR_MS);
    return () => window.clearTimeout(timer);
  }, [outcome]);
  const copy = async () => {
    try {
      await navigator.clipboard.writeText(text());
      setOutcome("Copied");
    } catch {
      setOutcome("Not copied: select it and press Ctrl+C");
    }
  };
  return (
    <span className="no-print inline-flex items-center gap-2">
      <Button size={size} tone="quiet" onClick={copy}>
        {outcome === "Copied" ? <Check aria-hidden size={14} /> : <Copy aria-hidden size={14} />}
        {label}
      </Button>
      <span role="status" className={outcome.startsWith("Not") ? "text-sm" : "sr-only"}>
        {outcome}
      </span>
    </span>
  );
}
