import { type ComponentProps, useId } from "react";
import { Field, type FieldText } from "./field";
import { CONTROL_STYLE, describedBy } from "./field-style";

type TextAreaProps = FieldText & Readonly<Omit<ComponentProps<"textarea">, "className">>;

export function TextArea({ label, hint, problem, hideLabel, optional, className, id, rows = 3, ...area }: TextAreaProps) {
  const ownId = useId();
  const fieldId = id ?? ownId;
  return (
    <Field id={fieldId} {...{ label, hint, problem, hideLabel, optional, className }}>
      <textarea
        {...area}
        id={fieldId}
        rows={rows}
        aria-invalid={problem ? true : undefined}
        aria-describedby={describedBy(fieldId, hint, problem)}
        className={CONTROL_STYLE}
      />
    </Field>
  );
}
