import { type ComponentProps, type ReactNode, useId } from "react";
import { FieldNotes } from "./field";
import { describedBy } from "./field-style";

type CheckboxProps = Readonly<
  Omit<ComponentProps<"input">, "type" | "className"> & { label: ReactNode; hint?: ReactNode; problem?: ReactNode }
>;

export function Checkbox({ label, hint, problem, id, ...input }: CheckboxProps) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <div className="flex flex-col gap-0.5">
      <label className="inline-flex min-h-7 items-center gap-2">
        <input
          {...input}
          type="checkbox"
          id={fieldId}
          aria-invalid={problem ? true : undefined}
          aria-describedby={describedBy(fieldId, hint, problem)}
          className="size-4 shrink-0"
        />
        {label}
      </label>
      <FieldNotes id={fieldId} hint={hint} problem={problem} />
    </div>
  );
}
