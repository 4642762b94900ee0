import { joinClasses } from "./join-classes";

export type ButtonTone = "plain" | "primary" | "quiet" | "grave";
export type ButtonSize = "normal" | "small";

/** A quiet one has no frame, and gets none by being switched off. */
const FRAMED_WHEN_OFF = "disabled:border-rule aria-disabled:border-rule";

const TONE: Readonly<Record<ButtonTone, string>> = {
  primary: `border-action bg-action text-on-action hover:bg-soft hover:border-soft ${FRAMED_WHEN_OFF}`,
  plain: `border-ink bg-sheet text-ink hover:bg-paper ${FRAMED_WHEN_OFF}`,
  quiet: "border-transparent bg-transparent text-ink hover:bg-rule",
  /** For what cannot be taken back; the words say what is lost. */
  grave: `border-unmet-mark bg-sheet text-unmet-mark hover:bg-unmet ${FRAMED_WHEN_OFF}`,
};

export function buttonStyle(tone: ButtonTone = "plain", size: ButtonSize = "normal", extra?: string): string {
  return joinClasses(
    "inline-flex items-center justify-center gap-2 rounded-md border font-semibold whitespace-nowrap no-underline",
    "disabled:bg-transparent disabled:text-soft aria-disabled:bg-transparent aria-disabled:text-soft",
    size === "small" ? "min-h-7 min-w-7 px-2 text-sm" : "min-h-9 px-3.5 text-table",
    TONE[tone],
    extra,
  );
}
