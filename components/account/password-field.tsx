"use client";

import { useState } from "react";
import { PASSWORD_LENGTH } from "@/lib/schemas/password-length";
import { Button } from "../ui/button";
import { Field } from "../ui/field";
import { CONTROL_STYLE, describedBy } from "../ui/field-style";

type PasswordFieldProps = Readonly<{
  id: string;
  name?: string;
  label?: string;
  /** A new one also says what is asked of it. */
  kind: "current" | "new";
  /** After what is asked of a new password. */
  hint?: string;
  problem?: string;
}>;

/** A password that can be looked at, pasted, and filled in by a password manager. */
export function PasswordField({ id, name = "password", label = "Password", kind, hint = "", problem }: PasswordFieldProps) {
  const [shown, setShown] = useState(false);
  const asked =
    kind === "new" ? `At least ${PASSWORD_LENGTH.least} characters; ${PASSWORD_LENGTH.advised} or more are better. ` : "";
  const said = `${asked}${hint}`;
  return (
    <Field id={id} label={label} hint={said} problem={problem}>
      <div className="flex gap-2">
        <input
          id={id}
          name={name}
          type={shown ? "text" : "password"}
          autoComplete={`${kind}-password`}
          autoCapitalize="none"
          spellCheck={false}
          aria-invalid={problem ? true : undefined}
          aria-describedby={describedBy(id, said, problem)}
          className={CONTROL_STYLE}
        />
        <Button
          aria-pressed={shown}
          aria-controls={id}
          aria-label={`Show ${label.toLowerCase()}`}
          onClick={() => setShown(!shown)}
        >
          {shown ? "Hide" : "Show"}
        </Button>
      </div>
    </Field>
  );
}
