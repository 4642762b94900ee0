"use client";

import { Checkbox } from "../../ui/checkbox";
import { Dialog } from "../../ui/dialog";

type Line = readonly [keys: string, meaning: string];

const WRITING: readonly Line[] = [
  ["Ctrl+Enter", "Solve the recipe as it stands"],
  ["Ctrl+S", "Save: asks for a name or a note first"],
  ["Ctrl+Z", "Undo the last change of the recipe; inside a text field, its own typing"],
  ["Ctrl+Shift+Z or Ctrl+Y", "Redo"],
];
const READING: readonly Line[] = [
  ["?", "This map"],
  ["Tab, Shift+Tab", "To the next or previous control; a grid is one stop"],
  ["Escape", "Closes a dialog or a menu, or leaves a cell as it was"],
];
const GROUPS: readonly { readonly title: string; readonly lines: readonly Line[]; readonly writes?: true }[] = [
  { title: "Anywhere on the bench", lines: WRITING, writes: true },
  { title: "Finding the way", lines: READING },
  {
    title: "On a slider",
    lines: [
      ["Arrow keys", "One step"],
      ["Page Up, Page Down", "A larger step"],
      ["Home, End", "To either end"],
    ],
  },
  {
    title: "On a pole in the plane",
    writes: true,
    lines: [
      ["Arrow keys", "Move it: left and right its speed, up and down its frequency"],
      ["Shift with an arrow", "Ten times as far"],
    ],
  },
  {
    title: "In a matrix",
    lines: [
      ["Arrow keys, Page Up, Page Down", "To another entry; with Shift, choose several"],
      ["Home, End", "To the ends of the row; with Ctrl, of the matrix"],
      ["Enter or F2", "Edit the entry; typing replaces it"],
      ["Delete", "Clear what is chosen"],
      ["Ctrl+C, Ctrl+V", "Copy and paste, also from a spreadsheet"],
    ],
  },
];

type KeyMapProps = Readonly<{
  open: boolean;
  onClose: () => void;
  mayEdit: boolean;
  /** Whether the key alone opens it: for speech input and for keys hit by accident it can be switched off. */
  byKey: boolean;
  onByKey: (on: boolean) => void;
}>;

/** Every key of the bench. */
export function KeyMap({ open, onClose, mayEdit, byKey, onByKey }: KeyMapProps) {
  return (
    <Dialog open={open} onClose={onClose} title="Keyboard map" wide>
      <div className="mb-4 gap-x-8 md:columns-2">
        {GROUPS.filter(({ writes }) => mayEdit || !writes).map(({ title, lines }) => (
          <section key={title} aria-label={title} className="mb-5 break-inside-avoid">
            <h3 className="mb-1 font-semibold">{title}</h3>
            <dl className="text-sm">
              {lines.map(([keys, meaning]) => (
                <div key={keys} className="border-t border-rule py-1.5 sm:grid sm:grid-cols-[10rem_1fr] sm:gap-x-4">
                  <dt>
                    <kbd className="font-mono">{keys}</kbd>
                  </dt>
                  <dd className="text-soft">{meaning}</dd>
                </div>
              ))}
            </dl>
          </section>
        ))}
      </div>
      <p className="mb-2 text-sm text-soft">On a Mac, Cmd in place of Ctrl.</p>
      <Checkbox
        label="Open this map with the key ?"
        checked={byKey}
        onChange={({ target }) => onByKey(target.checked)}
        hint="Off, it opens by the button “Keys” only. Kept in this browser."
      />
    </Dialog>
  );
}
