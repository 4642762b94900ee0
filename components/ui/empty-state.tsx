import type { ReactNode } from "react";

/** What belongs here, and the one thing to do about it. */
export function EmptyState({ title, action, children }: Readonly<{ title: string; action?: ReactNode; children: ReactNode }>) {
  return (
    <div className="border border-dashed border-control bg-sheet px-6 py-8">
      <h2 className="text-lg">{title}</h2>
      <div className="mt-1 mb-4 max-w-[60ch] text-soft">{children}</div>
      {action}
    </div>
  );
}
