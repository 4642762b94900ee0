export type BenchAct = "solve" | "save" | "undo" | "redo" | "map";

export type Pressed = {
  readonly key: string;
  /** Ctrl, or Cmd on a Mac. */
  readonly ctrl: boolean;
  readonly shift: boolean;
  readonly alt: boolean;
  /** Inside a text field, whose own undo and whose letters come first. */
  readonly typing: boolean;
};

/** What a key means anywhere on the bench; null leaves it to whatever has the focus. */
export function benchAct({ key, ctrl, shift, alt, typing }: Pressed): BenchAct | null {
  if (alt) return null;
  if (!ctrl) return key === "?" && !typing ? "map" : null;
  const name = key.length === 1 ? key.toLowerCase() : key;
  if (name === "Enter") return "solve";
  if (name === "s" && !shift) return "save";
  if (typing) return null;
  if (name === "z") return shift ? "redo" : "undo";
  return name === "y" && !shift ? "redo" : null;
}
