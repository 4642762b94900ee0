"use client";

import { formatNumber } from "@/control/words/format-number";
import { Button } from "../../ui/button";
import type { Solved } from "./bench-types";
import type { Bench } from "./use-bench";

const solvedWords = ({ source }: Solved) =>
  source.kind === "computed" && source.milliseconds !== null
    ? `Solved as it stands, in ${formatNumber(source.milliseconds, 2)} ms`
    : "Solved as it stands";

/** Stays in sight above the recipe, however long it is. */
export function SolveBar({ bench }: Readonly<{ bench: Bench }>) {
  const { solving, stale } = bench;
  const { busy, solved } = solving;
  const said = busy ? "Solving…" : stale ? "Changed since it was solved" : solved ? solvedWords(solved) : "Not solved yet";
  return (
    <div className="no-print sticky top-0 z-20 -mx-1 flex flex-wrap items-center gap-3 border-b border-rule bg-paper px-1 pt-1 pb-2">
      <h2 className="mr-auto">Recipe</h2>
      {busy ? (
        <Button size="small" onClick={solving.stop}>
          Stop
        </Button>
      ) : null}
      <Button tone="primary" busy={busy} onClick={bench.solve} aria-keyshortcuts="Control+Enter">
        Solve
      </Button>
      <p role="status" className="w-full text-sm text-soft">
        {said}
        {busy ? null : (
          <>
            {" · "}
            <kbd className="text-xs">Ctrl+Enter</kbd> solves
          </>
        )}
      </p>
    </div>
  );
}
