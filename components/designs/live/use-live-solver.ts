"use client";

import { useEffect, useState } from "react";
import { LiveSolver } from "./live-solver";

const makeWorker = () => new Worker(new URL("./design-worker.ts", import.meta.url), { type: "module", name: "design" });

/** The page's own solver; its worker starts with the first request and ends with the page. */
export function useLiveSolver(): LiveSolver {
  const [solver] = useState(() => new LiveSolver(makeWorker));
  useEffect(() => () => solver.stop(), [solver]);
  return solver;
}
