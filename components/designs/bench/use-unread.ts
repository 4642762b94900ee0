"use client";

import { useCallback, useState } from "react";
import type { FormReading } from "../recipe/read-form";

/** Places of the recipe whose field holds a text that is no number: the form keeps the last number, the text is not lost. */
export function useUnread() {
  const [unread, setUnread] = useState<ReadonlySet<string>>(new Set());
  const setUsable = useCallback((pointer: string, usable: boolean) => {
    setUnread((now) => {
      if (now.has(pointer) !== usable) return now;
      const next = new Set(now);
      if (usable) next.delete(pointer);
      else next.add(pointer);
      return next;
    });
  }, []);
  return { unread, setUsable };
}

export function withUnread(reading: FormReading, unread: ReadonlySet<string>): FormReading {
  if (unread.size === 0) return reading;
  const typed = [...unread].map((pointer) => ({ pointer, message: "What stands here is not a number" }));
  return { recipe: null, problems: [...typed, ...reading.problems] };
}
