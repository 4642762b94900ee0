"use client";

import { keepPreviousData, useInfiniteQuery } from "@tanstack/react-query";
import { designKeys, fetchDesigns } from "@/lib/client/designs";
import type { DesignQuery } from "@/lib/schemas/design";
import { useSession } from "../providers/session-provider";

/** The designs of a plant, a page at a time. */
export function useDesigns(plantId: string, archived: DesignQuery["archived"]) {
  const { resume } = useSession();
  return useInfiniteQuery({
    queryKey: designKeys.list(plantId, { archived }),
    queryFn: ({ signal, pageParam }) => resume(() => fetchDesigns(plantId, { archived, cursor: pageParam }, signal)),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
    placeholderData: keepPreviousData,
  });
}
