import { TextArea } from "./text-area";

type NoteFieldProps = Readonly<{
  id: string;
  label: string;
  value: string;
  problem?: string;
  hint?: string;
  onChange: (note: string) => void;
}>;

/** What somebody leaves for those who read it later; never asked for. */
export function NoteField({ onChange, ...field }: NoteFieldProps) {
  return <TextArea {...field} optional maxLength={2000} onChange={({ target }) => onChange(target.value)} />;
}
