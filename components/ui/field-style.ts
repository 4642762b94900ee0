/** Shared by every control that is typed into or chosen from. */
export const CONTROL_STYLE =
  "min-h-9 w-full rounded-md border border-control bg-sheet px-2.5 py-1 text-base text-ink placeholder:text-soft " +
  "disabled:border-rule disabled:bg-paper disabled:text-soft [&[readonly]]:bg-paper aria-invalid:border-2 aria-invalid:border-unmet-mark";

/** What `aria-describedby` names, or undefined when there is nothing to name. */
export function describedBy(id: string, hint: unknown, problem: unknown): string | undefined {
  const parts = [problem ? `${id}-problem` : "", hint ? `${id}-hint` : ""].filter(Boolean);
  return parts.length > 0 ? parts.join(" ") : undefined;
}
