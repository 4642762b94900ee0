"use client";

import { useEffect, useState } from "react";
import { LiveWorker } from "./live-worker";

const makeWorker = () => new Worker(new URL("./design-worker.ts", import.meta.url), { type: "module", name: "design" });

/** A worker of the page's own; it starts with the first request and ends with the page. */
export function useLiveWorker(): LiveWorker {
  const [worker] = useState(() => new LiveWorker(makeWorker));
  useEffect(() => () => worker.stop(), [worker]);
  return worker;
}
