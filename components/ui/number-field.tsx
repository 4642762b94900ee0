"use client";

import { type ReactNode, useEffect, useId, useRef, useState } from "react";
import { Button } from "./button";
import { Field, type FieldText } from "./field";
import { CONTROL_STYLE, describedBy } from "./field-style";
import { parseNumber } from "./parse-number";

type NumberFieldProps = FieldText &
  Readonly<{
    value: number | null;
    /** Called with each reading that is certain; null once emptied. Never called with a guess. */
    onChange: (value: number | null) => void;
    /** Tells whether what stands in the field can be used; a form with an unusable field is not sent. */
    onUsable?: (usable: boolean) => void;
    unit?: string;
    id?: string;
    name?: string;
    required?: boolean;
    disabled?: boolean;
    autoComplete?: string;
  }>;

const show = (value: number | null) => (value === null ? "" : String(value));

/** A figure with its unit, at full precision. Takes a decimal comma; `1,234` is asked back. */
export function NumberField(props: NumberFieldProps) {
  const { value, onChange, onUsable, unit, id, name, required, disabled, autoComplete = "off", hint, problem, ...text } = props;
  const ownId = useId();
  const fieldId = id ?? ownId;
  const [typed, setTyped] = useState(show(value));
  const [left, setLeft] = useState(false);
  const [given, setGiven] = useState(value);
  if (given !== value) {
    setGiven(value);
    const reading = parseNumber(typed);
    const same = reading.kind === "number" ? Object.is(reading.value, value) : value === null;
    if (!same) setTyped(show(value));
  }
  const reading = parseNumber(typed);
  useUsable(reading.kind === "number" || reading.kind === "empty", onUsable);

  const take = (entry: string) => {
    setTyped(entry);
    const next = parseNumber(entry);
    if (next.kind === "number") onChange(next.value);
    if (next.kind === "empty") onChange(null);
  };

  const ask = reading.kind === "ambiguous" ? <CommaQuestion typed={typed} reading={reading} onAnswer={take} /> : null;
  const unread = reading.kind === "not-a-number" && left ? "This is not a number. Write for example -0.25 or 1.2e-4." : null;
  const said: ReactNode = ask ?? unread ?? problem;
  return (
    <Field id={fieldId} hint={hint} problem={said} {...text}>
      <div className="flex items-center gap-2">
        <input
          id={fieldId}
          name={name}
          inputMode="text"
          autoComplete={autoComplete}
          spellCheck={false}
          required={required}
          disabled={disabled}
          value={typed}
          onChange={({ target }) => take(target.value)}
          onFocus={() => setLeft(false)}
          onBlur={() => setLeft(true)}
          aria-invalid={said ? true : undefined}
          aria-describedby={
            [describedBy(fieldId, hint, said), unit ? `${fieldId}-unit` : ""].filter(Boolean).join(" ") || undefined
          }
          className={`${CONTROL_STYLE} text-right font-mono`}
        />
        {unit ? (
          <span id={`${fieldId}-unit`} className="shrink-0 text-table text-soft">
            {unit}
          </span>
        ) : null}
      </div>
    </Field>
  );
}

/** Tells about each change, and that a field which is gone is in nobody's way. */
function useUsable(usable: boolean, onUsable: NumberFieldProps["onUsable"]): void {
  const tell = useRef(onUsable);
  tell.current = onUsable;
  useEffect(() => {
    if (usable) return;
    tell.current?.(false);
    return () => tell.current?.(true);
  }, [usable]);
}

type CommaQuestionProps = Readonly<{
  typed: string;
  reading: { readonly decimal: number; readonly grouped: number };
  onAnswer: (text: string) => void;
}>;

function CommaQuestion({ typed, reading, onAnswer }: CommaQuestionProps) {
  return (
    <>
      Is {typed.trim()} meant as{" "}
      {[reading.decimal, reading.grouped].map((value) => (
        <Button key={value} size="small" className="mx-0.5 font-mono" onClick={() => onAnswer(String(value))}>
          {String(value)}
        </Button>
      ))}
      ?
    </>
  );
}
