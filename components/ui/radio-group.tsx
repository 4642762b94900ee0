"use client";

import { type ReactNode, useId } from "react";
import { FieldNotes } from "./field";
import { describedBy } from "./field-style";
import { joinClasses } from "./join-classes";

export type Choice<T extends string> = {
  readonly value: T;
  readonly label: ReactNode;
  readonly hint?: ReactNode;
  readonly disabled?: boolean;
};

type RadioGroupProps<T extends string> = Readonly<{
  legend: ReactNode;
  hideLegend?: boolean;
  choices: readonly Choice<T>[];
  value: T | null;
  onChange: (value: T) => void;
  name?: string;
  hint?: ReactNode;
  problem?: ReactNode;
  id?: string;
  disabled?: boolean;
}>;

/** One below the other, each with room for a sentence. */
export function RadioGroup<T extends string>(props: RadioGroupProps<T>) {
  return <ChoiceSet {...props} segmented={false} />;
}

/** Side by side, for two to four short words: "Quadratic weights | Poles". */
export function Segmented<T extends string>(props: RadioGroupProps<T>) {
  return <ChoiceSet {...props} segmented />;
}

function ChoiceSet<T extends string>({
  legend,
  hideLegend,
  choices,
  value,
  onChange,
  name,
  hint,
  problem,
  id,
  disabled,
  segmented,
}: RadioGroupProps<T> & Readonly<{ segmented: boolean }>) {
  const ownId = useId();
  const groupId = id ?? ownId;
  return (
    <fieldset
      id={groupId}
      tabIndex={-1}
      disabled={disabled}
      aria-invalid={problem ? true : undefined}
      aria-describedby={describedBy(groupId, hint, problem)}
      className="flex min-w-0 flex-col gap-1 outline-none"
    >
      <legend className={hideLegend ? "sr-only" : "mb-1 text-table font-semibold"}>{legend}</legend>
      <div className={segmented ? "flex flex-wrap rounded-md border border-ink" : "flex flex-col gap-1"}>
        {choices.map((choice) => (
          <label
            key={choice.value}
            className={segmented ? segmentStyle(choice.value === value) : "flex min-h-7 items-baseline gap-2"}
          >
            <input
              type="radio"
              name={name ?? groupId}
              value={choice.value}
              checked={choice.value === value}
              disabled={choice.disabled}
              onChange={() => onChange(choice.value)}
              className={segmented ? "sr-only" : "size-4 shrink-0 translate-y-0.5"}
            />
            <span>
              {choice.label}
              {choice.hint && !segmented ? <span className="block text-sm text-soft">{choice.hint}</span> : null}
            </span>
          </label>
        ))}
      </div>
      <FieldNotes id={groupId} hint={hint} problem={problem} />
    </fieldset>
  );
}

const segmentStyle = (chosen: boolean) =>
  joinClasses(
    "relative flex min-h-8 flex-1 items-center justify-center px-3 text-center text-table whitespace-nowrap",
    "has-focus-visible:outline-2 has-focus-visible:outline-offset-2 has-focus-visible:outline-focus has-disabled:text-soft",
    chosen ? "bg-action text-on-action forced-colors:border-4" : "bg-sheet",
  );
