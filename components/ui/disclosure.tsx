import type { ReactNode } from "react";

type DisclosureProps = Readonly<{ summary: ReactNode; onOpen?: () => void; open?: boolean; children: ReactNode }>;

/** A detail that can be unfolded in place. Never for cautions. */
export function Disclosure({ summary, onOpen, open, children }: DisclosureProps) {
  return (
    <details open={open} onToggle={(event) => event.currentTarget.open && onOpen?.()} className="text-table">
      <summary className="inline-flex min-h-7 items-center gap-1.5 underline underline-offset-3 before:content-['+'] before:font-mono [details[open]>&]:before:content-['–']">
        {summary}
      </summary>
      <div className="pt-2">{children}</div>
    </details>
  );
}
