"use client";

import { useQuery } from "@tanstack/react-query";
import { type CurveQuery, compute, designKeys, fetchCurves } from "@/lib/client/designs";
import type { ResponseCurves } from "@/lib/schemas/evidence";
import { useSession } from "../../providers/session-provider";
import type { Solved } from "../bench/bench-types";
import { recipeKey } from "../recipe/read-form";

type Kind = ResponseCurves["kind"];
type Roles = CurveQuery["signals"];

const PLAIN_ROLES = ["commanded", "output", "input"] as const;
const ALL_ROLES = ["commanded", "output", "state", "estimate", "input"] as const;

/** Curves that are kept with a revision never change. */
export function useStoredCurves(revisionId: string | null, kind: Kind, withStates: boolean) {
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

/** The states of a loop that is not stored are computed once more, when somebody wants to see them: they would double every reply. */
function useComputedStates(solved: Solved, wanted: boolean) {
  const { resume } = useSession();
  const { recipe, ground } = solved;
  const revisionId = ground.plantRevision.id;
  return useQuery({
    queryKey: ["computations", revisionId, recipeKey(recipe), "states"],
    queryFn: async ({ signal }) => {
      const signals: Roles = ALL_ROLES;
      const body = { plant: { revisionId }, recipe: recipe as Parameters<typeof compute>[0]["recipe"], signals: [...signals] };
      return (await resume(() => compute(body, signal))).responses;
    },
    enabled: wanted,
    staleTime: Number.POSITIVE_INFINITY,
  });
}

/** The curves of what is shown, wherever they come from. */
export function useCurves(solved: Solved, kind: Kind, withStates: boolean) {
  const { source } = solved;
  const computedHere = source.kind === "computed";
  const stored = useStoredCurves(computedHere ? null : source.revisionId, kind, withStates);
  const states = useComputedStates(solved, computedHere && withStates);
  if (!computedHere) return { curves: stored.data ?? null, error: stored.error, again: stored.refetch };
  if (withStates) return { curves: states.data ?? null, error: states.error, again: states.refetch };
  return { curves: source.responses, error: null, again: stored.refetch };
}
