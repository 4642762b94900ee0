import { type ReactNode, useId } from "react";
import { joinClasses } from "./join-classes";

type SheetSectionProps = Readonly<{
  title: ReactNode;
  /** How to read what follows, on the heading's line. */
  note?: ReactNode;
  actions?: ReactNode;
  /** A thick rule above: the sheet's main divisions. */
  ruled?: boolean;
  children: ReactNode;
}>;

export function SheetSection({ title, note, actions, ruled, children }: SheetSectionProps) {
  const id = useId();
  return (
    <section aria-labelledby={id} className={joinClasses("mb-8", ruled && "border-t-2 border-ink pt-4")}>
      <div className="mb-2 flex flex-wrap items-baseline gap-x-4 gap-y-1">
        <h2 id={id}>{title}</h2>
        {note ? <p className="text-sm text-soft">{note}</p> : null}
        {actions ? <div className="no-print ml-auto flex flex-wrap gap-2">{actions}</div> : null}
      </div>
      {children}
    </section>
  );
}
