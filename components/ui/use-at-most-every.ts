"use client";

import { useEffect, useRef, useState } from "react";

/** The newest value, but changing at most once in `milliseconds`: for words that are read out while a hand is on a control. */
export function useAtMostEvery<T>(milliseconds: number, value: T): T {
  const [shown, setShown] = useState(value);
  const last = useRef(Number.NEGATIVE_INFINITY);
  useEffect(() => {
    if (Object.is(value, shown)) return;
    const wait = Math.max(0, last.current + milliseconds - performance.now());
    const timer = setTimeout(() => {
      last.current = performance.now();
      setShown(value);
    }, wait);
    return () => clearTimeout(timer);
  }, [value, shown, milliseconds]);
  return shown;
}
