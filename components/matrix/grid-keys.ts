import type { Place } from "./grid-edits";

export type Key = { readonly key: string; readonly ctrl: boolean; readonly shift: boolean; readonly alt: boolean };

export type GridAction =
  | { readonly do: "move"; readonly to: Place; readonly extend: boolean }
  | { readonly do: "edit" }
  /** A typed character takes the place of the entry. */
  | { readonly do: "replace"; readonly text: string }
  | { readonly do: "clear" }
  | { readonly do: "undo" }
  | { readonly do: "redo" }
  | { readonly do: "select-all" }
  | { readonly do: "select-one" };

const STEP: Readonly<Record<string, readonly [number, number]>> = {
  ArrowUp: [-1, 0],
  ArrowDown: [1, 0],
  ArrowLeft: [0, -1],
  ArrowRight: [0, 1],
  PageUp: [-10, 0],
  PageDown: [10, 0],
};

const clamp = (value: number, most: number) => Math.max(0, Math.min(most, value));

/** What a key means in a grid whose cell is not being edited; null leaves the key to the browser (Tab, copy, paste). */
export function gridAction(key: Key, at: Place, rows: number, columns: number): GridAction | null {
  const move = (r: number, c: number): GridAction => ({
    do: "move",
    to: { r: clamp(r, rows - 1), c: clamp(c, columns - 1) },
    extend: key.shift,
  });
  if (key.alt) return null;
  if (key.ctrl) {
    const name = key.key.length === 1 ? key.key.toLowerCase() : key.key;
    if (name === "Home") return move(0, 0);
    if (name === "End") return move(rows - 1, columns - 1);
    if (name === "z") return { do: key.shift ? "redo" : "undo" };
    if (name === "y") return { do: "redo" };
    if (name === "a") return { do: "select-all" };
    const step = STEP[name];
    return step ? move(at.r + step[0] * rows, at.c + step[1] * columns) : null;
  }
  const step = STEP[key.key];
  if (step) return move(at.r + step[0], at.c + step[1]);
  if (key.key === "Home") return move(at.r, 0);
  if (key.key === "End") return move(at.r, columns - 1);
  if (key.key === "Enter" || key.key === "F2") return { do: "edit" };
  if (key.key === "Delete" || key.key === "Backspace") return { do: "clear" };
  if (key.key === "Escape") return { do: "select-one" };
  if ([...key.key].length === 1 && key.key !== " ") return { do: "replace", text: key.key };
  return null;
}

/** Where the grid goes when an entry is finished: Enter down, and after typing over an entry the arrows too. */
export function afterEntry(key: Key, replacing: boolean): readonly [number, number] | null {
  if (key.key === "Enter") return key.shift ? [-1, 0] : [1, 0];
  if (!replacing || key.ctrl || key.alt) return null;
  const step = STEP[key.key];
  return step && key.key.startsWith("Arrow") ? step : null;
}
