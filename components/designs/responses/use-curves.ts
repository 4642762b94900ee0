"use client";

import { useQuery } from "@tanstack/react-query";
import { type CurveQuery, designKeys, fetchCurves } from "@/lib/client/designs";
import { useSession } from "../../providers/session-provider";
import type { Solved } from "../bench/bench-types";
import type { Curves } from "./curves";

const PLAIN_ROLES = ["commanded", "output", "input"] as const;
const ALL_ROLES = ["commanded", "output", "state", "estimate", "input"] as const;

/** Curves that are kept with a revision never change. */
export function useStoredCurves(revisionId: string | null, kind: Curves["kind"], withStates: boolean) {
  const { resume } = useSession();
  const query: CurveQuery = { kind, loop: "both", signals: withStates ? ALL_ROLES : PLAIN_ROLES };
  return useQuery({
    queryKey: designKeys.curves(revisionId ?? "none", query),
    queryFn: ({ signal }) => resume(() => fetchCurves(revisionId ?? "", query, signal)),
    enabled: revisionId !== null,
    staleTime: Number.POSITIVE_INFINITY,
    // While rows are switched on, those that are there already stay in sight.
    placeholderData: (before) => (before?.some((curve) => curve.kind === kind) ? before : undefined),
  });
}

type ShownCurves = {
  readonly curves: readonly Curves[] | null;
  readonly error: Error | null;
  readonly again: () => unknown;
};

/** The curves of what is shown, wherever they come from. */
export function useCurves({ source }: Solved, kind: Curves["kind"], withStates: boolean): ShownCurves {
  const stored = useStoredCurves(source.kind === "stored" ? source.revisionId : null, kind, withStates);
  if (source.kind === "computed") return { curves: source.curves, error: null, again: stored.refetch };
  return { curves: stored.data ?? null, error: stored.error, again: stored.refetch };
}
