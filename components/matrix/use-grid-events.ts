"use client";

import { type ClipboardEvent, type KeyboardEvent, type MouseEvent, type PointerEvent, useRef } from "react";
import type { Place } from "./grid-edits";
import { gridAction } from "./grid-keys";
import type { MatrixGridState } from "./use-matrix-grid";

export function placeOf(target: EventTarget): Place | null {
  const cell = target instanceof Element ? target.closest<HTMLElement>("td[data-r]") : null;
  return cell ? { r: Number(cell.dataset.r), c: Number(cell.dataset.c) } : null;
}

const focusIsIn = (target: EventTarget) => target instanceof Element && target.closest("td") === document.activeElement;

/** Handlers for the whole grid, so that a thousand cells carry none. */
export function useGridEvents(grid: MatrixGridState, rows: number, columns: number, readOnly: boolean) {
  const dragging = useRef(false);
  const tappedAgain = useRef(false);
  const { at } = grid;
  const here = (place: Place) => place.r === at.r && place.c === at.c;

  const copy = (event: ClipboardEvent, clear: boolean) => {
    if (grid.editing) return;
    event.preventDefault();
    event.clipboardData.setData("text/plain", grid.copied());
    if (clear) grid.act({ do: "clear" });
  };
  return {
    onKeyDown: (event: KeyboardEvent) => {
      if (grid.editing || !placeOf(event.target)) return;
      const key = { key: event.key, ctrl: event.ctrlKey || event.metaKey, shift: event.shiftKey, alt: event.altKey };
      const action = gridAction(key, at, rows, columns);
      if (!action) return;
      event.preventDefault();
      grid.act(action);
    },
    onPointerDown: (event: PointerEvent) => {
      const place = placeOf(event.target);
      if (!place || event.target instanceof HTMLInputElement) return;
      // A second tap edits; acted on at the click, after the browser has moved focus to the cell.
      tappedAgain.current = event.pointerType === "touch" && here(place) && focusIsIn(event.target);
      if (event.pointerType === "touch") return;
      dragging.current = true;
      grid.go(place, event.shiftKey);
    },
    onPointerOver: (event: PointerEvent) => {
      const place = placeOf(event.target);
      if (place && dragging.current && event.buttons === 1 && !here(place)) grid.go(place, true);
    },
    onPointerUp: () => {
      dragging.current = false;
    },
    onClick: (event: MouseEvent) => {
      const place = placeOf(event.target);
      if (!place || event.target instanceof HTMLInputElement) return;
      if (tappedAgain.current) grid.act({ do: "edit" });
      else if (!here(place) && !event.shiftKey) grid.go(place);
      tappedAgain.current = false;
    },
    onDoubleClick: (event: { target: EventTarget }) => {
      if (placeOf(event.target) && !grid.editing) grid.act({ do: "edit" });
    },
    onCopy: (event: ClipboardEvent) => copy(event, false),
    onCut: (event: ClipboardEvent) => copy(event, !readOnly),
    onPaste: (event: ClipboardEvent) => {
      const text = event.clipboardData.getData("text/plain");
      if (readOnly || (grid.editing && !/[\t\r\n]/.test(text.trim()))) return;
      event.preventDefault();
      grid.paste(text);
    },
  };
}
