import { FEWEST, MOST } from "@/lib/schemas/compared-count";

/** A design revision chosen to stand side by side. */
export type Picked = { readonly id: string; readonly name: string; readonly number: number };

/** Taken out where it is chosen already, else put behind the others as long as it fits. */
export function togglePicked(picked: readonly Picked[], one: Picked): readonly Picked[] {
  if (picked.some(({ id }) => id === one.id)) return picked.filter(({ id }) => id !== one.id);
  return picked.length >= MOST ? picked : [...picked, one];
}

export function pickedWords({ length }: readonly Picked[]): string {
  if (length === 0) return "Choose two to six designs, or revisions of one, to compare.";
  return `${length} chosen${length < FEWEST ? ", one more is needed" : length === MOST ? ", as many as fit" : ""}.`;
}
