"use client";

import { useEffect, useState } from "react";

const KEY = "gainwright:key-map";
const OFF = "off";

/** Whether `?` alone opens the keyboard map, as this browser remembers it. */
export function useMapKey(): readonly [boolean, (on: boolean) => void] {
  const [on, setOn] = useState(true);
  useEffect(() => {
    try {
      setOn(localStorage.getItem(KEY) !== OFF);
    } catch {
      // Storage switched off: the key works.
    }
  }, []);
  const choose = (next: boolean) => {
    setOn(next);
    try {
      if (next) localStorage.removeItem(KEY);
      else localStorage.setItem(KEY, OFF);
    } catch {
      // It holds for this page then.
    }
  };
  return [on, choose];
}
