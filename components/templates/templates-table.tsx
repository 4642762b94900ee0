"use client";

import { keepPreviousData, useInfiniteQuery } from "@tanstack/react-query";
import Link from "next/link";
import { parseAsStringLiteral, useQueryState } from "nuqs";
import type { ReactNode } from "react";
import { fetchTemplates, templateKeys } from "@/lib/client/templates";
import type { TemplateSummary } from "@/lib/schemas/template";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { type Column, DataTable } from "../ui/data-table";
import { EmptyState } from "../ui/empty-state";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { ShowMore } from "../ui/show-more";
import { SHOWN, ShownSelect } from "../ui/shown-select";
import { When } from "../ui/when";

const columns: readonly Column<TemplateSummary>[] = [
  {
    key: "name",
    header: "Template",
    cell: ({ id, name, archivedAt }) => (
      <span className="inline-flex flex-wrap items-baseline gap-x-2">
        <Link href={`/templates/${id}`} className="font-semibold break-words">
          {name}
        </Link>
        {archivedAt ? <Chip>archived</Chip> : null}
      </span>
    ),
  },
  {
    key: "description",
    header: "What it is",
    cell: ({ description }) => <span className="line-clamp-2 max-w-prose break-words">{description || "–"}</span>,
  },
  { key: "open", header: "To fill in", kind: "figure", cell: ({ openParameterCount }) => openParameterCount },
  { key: "order", header: "States", kind: "figure", cell: ({ order }) => order },
  { key: "created", header: "Published", cell: ({ createdAt }) => <When at={createdAt} /> },
];

/** The filter lives in the address, so that a colleague sees the same list. */
export function TemplatesTable({ firstTemplate }: Readonly<{ firstTemplate: ReactNode }>) {
  const { resume } = useSession();
  const [archived, setArchived] = useQueryState("archived", parseAsStringLiteral(SHOWN).withDefault("no"));
  const templates = useInfiniteQuery({
    queryKey: templateKeys.list({ archived }),
    queryFn: ({ signal, pageParam }) => resume(() => fetchTemplates({ archived, cursor: pageParam }, signal)),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
    placeholderData: keepPreviousData,
  });
  if (templates.isPending) return <LoadingState label="Loading the templates" />;
  if (templates.isError) {
    return (
      <ErrorState
        title="The templates could not be loaded."
        action={<Button onClick={() => templates.refetch()}>Try again</Button>}
      >
        {templates.error.message}
      </ErrorState>
    );
  }
  const rows = templates.data.pages.flatMap(({ items }) => items);
  return (
    <>
      <ShownSelect value={archived} onChange={setArchived} className="mb-4 w-44" />
      {rows.length > 0 ? (
        <DataTable caption="Templates of the team" columns={columns} rows={rows} rowKey={({ id }) => id} />
      ) : archived === "no" ? (
        firstTemplate
      ) : (
        <EmptyState title="No template here" action={<Button onClick={() => setArchived("no")}>Show those in use</Button>}>
          {archived === "yes" ? "No template was archived." : "The team has no template."}
        </EmptyState>
      )}
      <ShowMore list={templates} />
    </>
  );
}
