"use client";

import { useRouter } from "next/navigation";
import { useEffect } from "react";
import type { Base } from "./bench-base";
import type { BenchStart } from "./bench-types";

/** Once the newest revision is shown on the page of an older one, for example after a save from there, the address follows. */
export function useNewestAddress({ older, plant }: BenchStart, { design, revision }: Base): void {
  const router = useRouter();
  const newest = older && design && revision?.id === design.currentRevision.id ? design.id : null;
  useEffect(() => {
    if (newest) router.replace(`/plants/${plant.id}/designs/${newest}`);
  }, [newest, plant.id, router]);
}
