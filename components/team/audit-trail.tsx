"use client";

import { useInfiniteQuery } from "@tanstack/react-query";
import Link from "next/link";
import { fetchAuditEvents, teamKeys } from "@/lib/client/account";
import type { AuditEvent } from "@/lib/schemas/team";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { type Column, DataTable } from "../ui/data-table";
import { EmptyState } from "../ui/empty-state";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { When } from "../ui/when";
import { auditHref, auditWords } from "./audit-words";

const columns: readonly Column<AuditEvent>[] = [
  { key: "when", header: "When", cell: ({ at }) => <When at={at} /> },
  {
    key: "who",
    header: "Who",
    cell: ({ actor, data }) => (
      <span className="inline-flex flex-wrap items-baseline gap-x-2">
        {actor ?? "somebody"}
        {data.tokenId ? <Chip>by access token</Chip> : null}
      </span>
    ),
  },
  { key: "what", header: "What", cell: (event) => <What event={event} /> },
  { key: "revision", header: "Revision", kind: "figure", cell: ({ revision }) => revision ?? "" },
  {
    key: "request",
    header: "Request",
    cell: ({ requestId }) => <code className="text-xs break-all text-soft">{requestId}</code>,
  },
];

/** Who did what, newest first, a page at a time. Nothing here can be changed or deleted. */
export function AuditTrail() {
  const { resume } = useSession();
  const trail = useInfiniteQuery({
    queryKey: teamKeys.audit,
    queryFn: ({ signal, pageParam }) => resume(() => fetchAuditEvents(pageParam, signal)),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
  });
  if (trail.isPending) return <LoadingState label="Loading the audit trail" lines={8} />;
  if (trail.isError) {
    return (
      <ErrorState
        title="The audit trail could not be loaded."
        action={<Button onClick={() => trail.refetch()}>Try again</Button>}
      >
        {trail.error.message}
      </ErrorState>
    );
  }
  const events = trail.data.pages.flatMap(({ items }) => items);
  if (events.length === 0) {
    return (
      <EmptyState title="Nothing has happened yet">Every change to plants, designs and people is written down here.</EmptyState>
    );
  }
  return (
    <>
      <DataTable caption="Audit trail" columns={columns} rows={events} rowKey={({ id }) => id} rowHeader="when" />
      <div className="mt-4 flex items-center gap-4">
        {trail.hasNextPage ? (
          <Button busy={trail.isFetchingNextPage} onClick={() => trail.fetchNextPage()}>
            {trail.isFetchingNextPage ? "Loading…" : "Show earlier events"}
          </Button>
        ) : (
          <p className="text-sm text-soft">This is the beginning of the trail.</p>
        )}
      </div>
    </>
  );
}

function What({ event }: Readonly<{ event: AuditEvent }>) {
  const { did, subject, more } = auditWords(event);
  const href = auditHref(event);
  return (
    <span className="break-words">
      {did} {subject && href ? <Link href={href}>{subject}</Link> : subject} {more}
    </span>
  );
}
