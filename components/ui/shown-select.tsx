import { Select } from "./select";

/** The parts of a list, as they stand in its address. */
export const SHOWN = ["no", "yes", "all"] as const;
export type Shown = (typeof SHOWN)[number];

const OPTIONS = [
  { value: "no", label: "in use" },
  { value: "yes", label: "archived" },
  { value: "all", label: "all" },
];

type ShownSelectProps = Readonly<{ value: Shown; className?: string; onChange: (shown: Shown) => void }>;

/** Which part of a list is shown: what is in use, what was archived, or both. */
export function ShownSelect({ value, className, onChange }: ShownSelectProps) {
  return (
    <Select
      label="Show"
      value={value}
      onChange={({ target }) => onChange(SHOWN.find((shown) => shown === target.value) ?? "no")}
      options={OPTIONS}
      className={className}
    />
  );
}
