"use client";

import { type RefObject, useCallback, useEffect, useState } from "react";
import { flushSync } from "react-dom";

const LOOK_EVERY_MS = 150;
const GIVE_UP_AFTER_MS = 8_000;
const REDRAWN_AFTER_MS = 600;

const pause = (ms: number) => new Promise((resolve) => window.setTimeout(resolve, ms));
/** Charts take the width of their frames when the window says that it changed. */
const fitCharts = () => window.dispatchEvent(new Event("resize"));

/** Every chart that will be drawn is drawn: each stands in a `data-chart` frame. */
const allDrawn = (page: HTMLElement) =>
  [...page.querySelectorAll("[data-chart]")].every((frame) => frame.querySelector("svg.main-svg") !== null) &&
  page.querySelector("[data-chart-pending]") === null;

/** Shows everything before it is printed: what is folded, and what is drawn only once it is seen. */
export function usePrinting(page: RefObject<HTMLElement | null>) {
  const [whole, setWhole] = useState(false);
  const [waiting, setWaiting] = useState(false);

  // The browser's own command cannot wait for charts, but what is folded opens in time.
  useEffect(() => {
    const turn = (shown: boolean) => {
      flushSync(() => setWhole(shown));
      fitCharts();
    };
    const before = () => turn(true);
    const after = () => turn(false);
    window.addEventListener("beforeprint", before);
    window.addEventListener("afterprint", after);
    return () => {
      window.removeEventListener("beforeprint", before);
      window.removeEventListener("afterprint", after);
    };
  }, []);

  const print = useCallback(async () => {
    setWaiting(true);
    flushSync(() => setWhole(true));
    for (let waited = 0; waited < GIVE_UP_AFTER_MS; waited += LOOK_EVERY_MS) {
      await pause(LOOK_EVERY_MS);
      if (page.current === null || allDrawn(page.current)) break;
    }
    fitCharts();
    await pause(REDRAWN_AFTER_MS);
    setWaiting(false);
    window.print();
  }, [page]);

  return { whole, waiting, print };
}
