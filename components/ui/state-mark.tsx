export type StateKind = "met" | "caution" | "unmet";

export const STATE_WORD: Readonly<Record<StateKind, string>> = { met: "Met", caution: "Caution", unmet: "Not met" };

const COLOUR: Readonly<Record<StateKind, string>> = {
  met: "text-met-mark",
  caution: "text-caution-mark",
  unmet: "text-unmet-mark",
};

/** Tick, triangle or cross, drawn: neither typeface has them. The word stands beside it, or is given to screen readers by `word`. */
export function StateMark({ kind, word }: Readonly<{ kind: StateKind; word?: string }>) {
  return (
    <>
      <svg aria-hidden="true" width="14" height="14" viewBox="0 0 14 14" className={`inline-block shrink-0 ${COLOUR[kind]}`}>
        {kind === "met" ? <path d="M2 7.6 5.4 11 12 3" fill="none" stroke="currentColor" strokeWidth="2.2" /> : null}
        {kind === "caution" ? (
          <>
            <path d="M7 1.2 13.4 12.6H.6Z" fill="currentColor" />
            <path d="M7 5.2v3.6M7 10v1.4" stroke="var(--sheet)" strokeWidth="1.5" />
          </>
        ) : null}
        {kind === "unmet" ? <path d="m2.5 2.5 9 9m0-9-9 9" stroke="currentColor" strokeWidth="2.4" /> : null}
      </svg>
      {word ? <span className="sr-only">{word}</span> : null}
    </>
  );
}
