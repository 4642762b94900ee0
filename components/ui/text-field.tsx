import { type ComponentProps, useId } from "react";
import { Field, type FieldText } from "./field";
import { CONTROL_STYLE, describedBy } from "./field-style";

type TextFieldProps = FieldText & Readonly<Omit<ComponentProps<"input">, "className">>;

export function TextField({ label, hint, problem, hideLabel, optional, className, id, ...input }: TextFieldProps) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} {...{ label, hint, problem, hideLabel, optional, className }}>
      <input
        type="text"
        {...input}
        id={fieldId}
        aria-invalid={problem ? true : undefined}
        aria-describedby={describedBy(fieldId, hint, problem)}
        className={CONTROL_STYLE}
      />
    </Field>
  );
}
