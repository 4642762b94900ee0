import type { ReactNode } from "react";

/** One part of the evidence under its own heading. */
export function EvidencePart({ title, children }: Readonly<{ title: string; children: ReactNode }>) {
  return (
    <section className="flex min-w-0 flex-col gap-2 break-inside-avoid">
      <h3 className="text-table font-semibold text-soft">{title}</h3>
      {children}
    </section>
  );
}
