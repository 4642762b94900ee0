import type { ReactNode } from "react";
import { Button } from "../../ui/button";
import { SheetSection } from "../../ui/sheet-section";

type EditorSectionProps = Readonly<{
  title: string;
  note: ReactNode;
  /** What one more of it is: "axis". */
  one: string;
  /** Absent where nothing may be changed. */
  onAdd?: () => void;
  /** Said in place of an empty list. */
  none: string;
  count: number;
  children: ReactNode;
}>;

/** A list of the plant that can be added to. */
export function EditorSection({ title, note, one, onAdd, none, count, children }: EditorSectionProps) {
  const add = onAdd ? (
    <Button size="small" onClick={onAdd}>
      Add {one}
    </Button>
  ) : null;
  return (
    <SheetSection title={title} note={note} actions={add}>
      {count === 0 ? <p className="text-soft">{none}</p> : children}
    </SheetSection>
  );
}
