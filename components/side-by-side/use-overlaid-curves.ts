"use client";

import { useQueries } from "@tanstack/react-query";
import { type CurveQuery, designKeys, fetchCurves } from "@/lib/client/designs";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import { useSession } from "../providers/session-provider";
import { type Loop, loopOf, type OverlaidDesign, sourceOf } from "./overlay-pictures";

/** The step of each design on the quantity commanded, in the loop wanted; curves of a revision never change. */
export function useOverlaidCurves(designs: readonly OverlaidDesign[], commanded: string, wanted: Loop) {
  const { resume } = useSession();
  return useQueries({
    queries: designs.map((design) => {
      const source = sourceOf(design, commanded);
      const query: CurveQuery = { kind: "step", loop: loopOf(design, wanted), source, signals: ["commanded", "output", "input"] };
      return {
        queryKey: designKeys.curves(design.id, query),
        queryFn: ({ signal }: { signal: AbortSignal }) => resume(() => fetchCurves(design.id, query, signal)),
        enabled: source >= 0 && design.figures.length > 0,
        staleTime: Number.POSITIVE_INFINITY,
      };
    }),
    combine: (results) => ({
      curves: results.map(({ data }): ResponseCurves | null => data?.[0] ?? null),
      loading: results.some(({ isLoading }) => isLoading),
      error: results.find(({ error }) => error)?.error ?? null,
      again: () => results.filter(({ isError }) => isError).map(({ refetch }) => refetch()),
    }),
  });
}
