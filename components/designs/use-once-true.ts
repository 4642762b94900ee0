"use client";

import { useState } from "react";

/** True from the first time on that `now` is: what was opened for a reason stays open when the reason is mended. */
export function useOnceTrue(now: boolean): boolean {
  const [was, setWas] = useState(now);
  if (now && !was) setWas(true);
  return now || was;
}
