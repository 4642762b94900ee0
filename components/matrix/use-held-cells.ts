"use client";

import { useCallback, useLayoutEffect, useRef, useState } from "react";
import { areaOf, type Place } from "./grid-edits";

const FIRST: Place = { r: 0, c: 0 };

/** The cell in hand and the area selected with it; keeps both inside a grid that shrinks. */
export function useHeldCells(id: string, rows: number, columns: number) {
  const [held, setHeld] = useState({ at: FIRST, anchor: FIRST });
  const focusWanted = useRef(false);
  const inside = ({ r, c }: Place): Place => ({
    r: Math.max(0, Math.min(r, rows - 1)),
    c: Math.max(0, Math.min(c, columns - 1)),
  });
  const at = inside(held.at);
  const cellId = useCallback((r: number, c: number) => `${id}-${r}-${c}`, [id]);

  // Focus follows the cell in hand, but only after something the reader did inside the grid.
  useLayoutEffect(() => {
    if (!focusWanted.current) return;
    focusWanted.current = false;
    document.getElementById(cellId(at.r, at.c))?.focus();
  });

  const select = (to: Place, anchor: Place) => {
    focusWanted.current = true;
    setHeld({ at: inside(to), anchor: inside(anchor) });
  };
  return {
    at,
    area: areaOf(at, inside(held.anchor)),
    cellId,
    select,
    go: (to: Place, extend = false) => select(to, extend ? held.anchor : to),
  };
}
