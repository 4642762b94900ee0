import { type ComponentProps, useId } from "react";
import { Field, type FieldText } from "./field";
import { CONTROL_STYLE, describedBy } from "./field-style";

export type Option = { readonly value: string; readonly label: string; readonly disabled?: boolean };

type SelectProps = FieldText &
  Readonly<Omit<ComponentProps<"select">, "className" | "children"> & { options: readonly Option[] }>;

/** The browser's own list: right on a keyboard, on a tablet and in forced colours. */
export function Select({ label, hint, problem, hideLabel, optional, className, id, options, ...select }: SelectProps) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} {...{ label, hint, problem, hideLabel, optional, className }}>
      <select
        {...select}
        id={fieldId}
        aria-invalid={problem ? true : undefined}
        aria-describedby={describedBy(fieldId, hint, problem)}
        className={CONTROL_STYLE}
      >
        {options.map(({ value, label: text, disabled }) => (
          <option key={value} value={value} disabled={disabled}>
            {text}
          </option>
        ))}
      </select>
    </Field>
  );
}
