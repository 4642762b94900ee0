import { TextField } from "../ui/text-field";

type EmailFieldProps = Readonly<{
  id?: string;
  /** Given where the address is settled: shown, and not to be changed. */
  settled?: string;
  hint?: string;
  problem?: string;
}>;

/** The address somebody signs in with, as password managers know it. */
export function EmailField({ id, settled, hint, problem }: EmailFieldProps) {
  return (
    <TextField
      id={id}
      name="email"
      type="email"
      label="E-mail address"
      autoComplete="username"
      defaultValue={settled}
      readOnly={settled !== undefined}
      hint={hint}
      problem={problem}
    />
  );
}
