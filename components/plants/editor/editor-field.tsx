import { TextField } from "../../ui/text-field";

type EditorFieldProps = Readonly<{
  /** For screen readers: a column heading says it to the eye. */
  label: string;
  value: string;
  readOnly: boolean;
  maxLength: number;
  spellCheck?: boolean;
  problem?: string;
  className?: string;
  onChange: (text: string) => void;
}>;

/** A short text in a row of the editor. */
export function EditorField({ onChange, ...field }: EditorFieldProps) {
  return <TextField {...field} hideLabel onChange={({ target }) => onChange(target.value)} />;
}
