import { TextField } from "./text-field";

type NameFieldProps = Readonly<{
  id: string;
  label: string;
  value: string;
  problem?: string;
  hint?: string;
  className?: string;
  onChange: (name: string) => void;
}>;

/** The name or title of something the team keeps. */
export function NameField({ onChange, ...field }: NameFieldProps) {
  return <TextField {...field} maxLength={120} onChange={({ target }) => onChange(target.value)} />;
}
