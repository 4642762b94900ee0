"use client";

import { useQuery } from "@tanstack/react-query";
import type { PoleEntry } from "@/control/design/recipe";
import type { Complex, PlantModel } from "@/control/plant/model";

/** Start values for poles. The eigenvalues they come from are computed in the browser once a list of poles is shown. */
export function usePoleProposals(model: PlantModel, wanted: boolean) {
  const { data } = useQuery({
    queryKey: ["plant-facts", model.timeBase, model.A, model.C],
    queryFn: async () => {
      const [{ plantFacts }, propose] = await Promise.all([import("./plant-facts"), import("./propose-poles")]);
      return { ...plantFacts(model), propose };
    },
    enabled: wanted,
    staleTime: Number.POSITIVE_INFINITY,
  });
  if (!data) return null;
  const { poles, hidden, propose } = data;
  const { timeBase } = model;
  return {
    hidden,
    fromPlant: (): PoleEntry[] => propose.proposeFromPlant(poles, timeBase),
    fromLoop: (loop: readonly Complex[]): PoleEntry[] => propose.asEntries(loop),
    forObserver: (loop: readonly Complex[], count: number): PoleEntry[] => propose.proposeObserver(loop, count, timeBase),
    poles,
  };
}
