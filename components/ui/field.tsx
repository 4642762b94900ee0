import type { ReactNode } from "react";
import { joinClasses } from "./join-classes";
import { StateMark } from "./state-mark";

export type FieldText = Readonly<{
  label: ReactNode;
  hint?: ReactNode;
  /** What is wrong and what to do; sets aria-invalid on the control. */
  problem?: ReactNode;
  /** Keeps the label for screen readers only, where a column heading says it already. */
  hideLabel?: boolean;
  optional?: boolean;
  className?: string;
}>;

/** Label above, control, then the problem and the hint; ids follow `${id}-problem` and `${id}-hint`. */
export function Field({
  id,
  label,
  hint,
  problem,
  hideLabel,
  optional,
  className,
  children,
}: FieldText & Readonly<{ id: string; children: ReactNode }>) {
  return (
    <div className={joinClasses("flex flex-col gap-1", className)}>
      <label htmlFor={id} className={hideLabel ? "sr-only" : "text-table font-semibold"}>
        {label}
        {optional ? <span className="font-normal text-soft"> (may be left empty)</span> : null}
      </label>
      {children}
      <FieldNotes id={id} hint={hint} problem={problem} />
    </div>
  );
}

export function FieldNotes({ id, hint, problem }: Readonly<{ id: string; hint?: ReactNode; problem?: ReactNode }>) {
  return (
    <>
      {problem ? (
        <p id={`${id}-problem`} className="flex items-baseline gap-1.5 text-sm">
          <StateMark kind="unmet" word="Not right: " />
          <span>{problem}</span>
        </p>
      ) : null}
      {hint ? (
        <p id={`${id}-hint`} className="text-sm text-soft">
          {hint}
        </p>
      ) : null}
    </>
  );
}
