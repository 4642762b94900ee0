"use client";

import { useId, useState } from "react";
import { cut, EMPTY_ENTRY, type Entries, fill, writeBlock } from "./grid-edits";
import type { GridAction } from "./grid-keys";
import { pasteInto } from "./grid-paste";
import { entriesAsText } from "./matrix-text";
import { readTyped } from "./parse-pasted";
import { useDoubts } from "./use-doubts";
import { type OnEntries, type OuterHistory, useGridHistory } from "./use-grid-history";
import { useHeldCells } from "./use-held-cells";

type GridOptions = {
  readonly entries: Entries;
  readonly onChange: OnEntries | undefined;
  readonly history: OuterHistory | undefined;
  readonly symmetric: boolean;
  readonly readOnly: boolean;
  readonly problems: ReadonlyMap<string, string>;
};

export type MatrixGridState = ReturnType<typeof useMatrixGrid>;

/** What a matrix grid does; `MatrixGrid` draws it. */
export function useMatrixGrid({ entries, onChange, history, symmetric, readOnly, problems }: GridOptions) {
  const id = useId();
  const [rows, columns] = [entries.length, entries[0]?.length ?? 0];
  const { at, area, cellId, select, go } = useHeldCells(id, rows, columns);
  const [editing, setEditing] = useState<{ readonly text: string; readonly replacing: boolean } | null>(null);
  const [said, setSaid] = useState("");
  const [allProblems, addDoubts] = useDoubts(entries, problems);
  const { commit, undo, redo } = useGridHistory(entries, onChange, history);

  const finish = (move: readonly [number, number] | null) => {
    if (!editing) return;
    setEditing(null);
    if (editing.text !== entries[at.r][at.c]) {
      const { entry, message } = readTyped(editing.text);
      commit(writeBlock(entries, at, [[entry]], symmetric).entries, "edit");
      if (message) addDoubts([{ ...at, entry, message }]);
    }
    if (move) go({ r: at.r + move[0], c: at.c + move[1] });
  };

  const act = (action: GridAction) => {
    if (action.do === "move") go(action.to, action.extend);
    if (action.do === "select-one") go(at);
    if (action.do === "select-all") select({ r: 0, c: 0 }, { r: rows - 1, c: columns - 1 });
    if (readOnly) return;
    if (action.do === "edit") setEditing({ text: entries[at.r][at.c], replacing: false });
    if (action.do === "replace") setEditing({ text: action.text, replacing: true });
    if (action.do === "clear") commit(fill(entries, area, EMPTY_ENTRY, symmetric), "clear");
    if (action.do === "undo") undo();
    if (action.do === "redo") redo();
  };

  const paste = (text: string) => {
    const outcome = pasteInto(entries, area, text, symmetric);
    setEditing(null);
    commit(outcome.entries, "paste");
    addDoubts(outcome.doubts);
    select({ r: outcome.area.top, c: outcome.area.left }, { r: outcome.area.bottom, c: outcome.area.right });
    setSaid(outcome.said);
  };

  const type = (text: string) => setEditing((now) => (now ? { ...now, text } : now));
  const cancel = () => {
    setEditing(null);
    go(at);
  };
  const copied = () => entriesAsText(cut(entries, area));
  return { id, cellId, at, area, editing, said, problems: allProblems, go, act, paste, finish, type, cancel, copied };
}
