"use client";

import { parseAsArrayOf, parseAsStringLiteral, useQueryStates } from "nuqs";
import type { GridWanted, LoopChoice, RowRole } from "./response-rows";

const KINDS = ["step", "initial", "disturbance"] as const;
const LOOPS = ["observer", "full-state", "both"] as const;
export const ROW_ROLES: readonly RowRole[] = ["commanded", "output", "state", "input"];
const DEFAULT_ROWS: RowRole[] = ["commanded", "input"];

/** What of the responses is shown; it lives in the address, so that a colleague sees the same picture. */
export function useResponseView(hasObserver: boolean) {
  const [view, setView] = useQueryStates(
    {
      response: parseAsStringLiteral(KINDS).withDefault("step"),
      loop: parseAsStringLiteral(LOOPS).withDefault("observer"),
      rows: parseAsArrayOf(parseAsStringLiteral(ROW_ROLES)).withDefault(DEFAULT_ROWS),
    },
    { history: "replace" },
  );
  const loop: LoopChoice = hasObserver ? view.loop : "full-state";
  const wanted: GridWanted = { kind: view.response, loop, roles: ROW_ROLES.filter((role) => view.rows.includes(role)) };
  return {
    wanted,
    setKind: (response: GridWanted["kind"]) => void setView({ response }),
    setLoop: (next: LoopChoice) => void setView({ loop: next }),
    setRow: (role: RowRole, shown: boolean) =>
      void setView({ rows: ROW_ROLES.filter((other) => (other === role ? shown : view.rows.includes(other))) }),
  };
}
