"use client";

import { useInfiniteQuery } from "@tanstack/react-query";
import { designKeys, fetchDesignRevisions } from "@/lib/client/designs";
import { useSession } from "../providers/session-provider";

/** The revisions of a design, newest first, a page at a time. */
export function useDesignRevisions(designId: string) {
  const { resume } = useSession();
  return useInfiniteQuery({
    queryKey: designKeys.revisions(designId),
    queryFn: ({ signal, pageParam }) => resume(() => fetchDesignRevisions(designId, { cursor: pageParam }, signal)),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
  });
}
