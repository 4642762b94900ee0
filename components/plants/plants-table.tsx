"use client";

import { keepPreviousData, useInfiniteQuery } from "@tanstack/react-query";
import Link from "next/link";
import { parseAsString, parseAsStringLiteral, useQueryStates } from "nuqs";
import { fetchPlants, plantKeys } from "@/lib/client/plants";
import type { PlantSummary } from "@/lib/schemas/plant";
import { useSession } from "../providers/session-provider";
import { Button } from "../ui/button";
import { Chip } from "../ui/chip";
import { type Column, DataTable, type Sort } from "../ui/data-table";
import { EmptyState } from "../ui/empty-state";
import { ErrorState } from "../ui/error-state";
import { LoadingState } from "../ui/loading-state";
import { ShowMore } from "../ui/show-more";
import { SHOWN, ShownSelect } from "../ui/shown-select";
import { TextField } from "../ui/text-field";
import { whenText } from "../ui/when-text";
import { AxisTags } from "./axis-tags";
import { timeBaseText } from "./time-base-text";

const SORTS = ["name", "-name", "updated", "-updated"] as const;
const SEARCH_PAUSE_MS = 250;

const columns: readonly Column<PlantSummary>[] = [
  {
    key: "name",
    header: "Plant",
    sortBy: ({ name }) => name,
    cell: ({ id, name, archivedAt }) => (
      <>
        <Link href={`/plants/${id}`} className="font-semibold">
          {name}
        </Link>
        {archivedAt ? <Chip>archived</Chip> : null}
      </>
    ),
  },
  { key: "axes", header: "Axes", cell: ({ axes }) => <AxisTags axes={axes} /> },
  { key: "order", header: "States", kind: "figure", cell: ({ order }) => order },
  { key: "inputs", header: "Inputs", kind: "figure", cell: ({ inputCount }) => inputCount },
  { key: "outputs", header: "Outputs", kind: "figure", cell: ({ outputCount }) => outputCount },
  { key: "time", header: "Time base", cell: ({ timeBase }) => timeBaseText(timeBase) },
  { key: "designs", header: "Designs", kind: "figure", cell: ({ designCount }) => designCount },
  { key: "revision", header: "Revision", kind: "figure", cell: ({ currentRevision }) => currentRevision.number },
  { key: "updated", header: "Changed", sortBy: ({ updatedAt }) => updatedAt, cell: ({ updatedAt }) => whenText(updatedAt) },
];

/** Search, filter and order live in the address, so that a colleague sees the same list. */
export function PlantsTable({ firstPlant }: Readonly<{ firstPlant: React.ReactNode }>) {
  const { resume } = useSession();
  const [view, setView] = useQueryStates(
    {
      search: parseAsString.withDefault("").withOptions({ limitUrlUpdates: { method: "debounce", timeMs: SEARCH_PAUSE_MS } }),
      sort: parseAsStringLiteral(SORTS).withDefault("-updated"),
      archived: parseAsStringLiteral(SHOWN).withDefault("no"),
    },
    { history: "replace" },
  );
  const plants = useInfiniteQuery({
    queryKey: plantKeys.list(view),
    queryFn: ({ signal, pageParam }) => resume(() => fetchPlants({ ...view, cursor: pageParam }, signal)),
    initialPageParam: undefined as string | undefined,
    getNextPageParam: ({ nextCursor }) => nextCursor ?? undefined,
    placeholderData: keepPreviousData,
  });
  const untouched = view.search === "" && view.archived === "no";
  if (plants.isPending) return <LoadingState label="Loading the plants" />;
  if (plants.isError) return <ErrorState title="The plants could not be loaded.">{plants.error.message}</ErrorState>;
  const rows = plants.data.pages.flatMap(({ items }) => items);
  if (rows.length === 0 && untouched) return firstPlant;
  return (
    <>
      <div className="mb-4 flex flex-wrap items-end gap-4">
        <TextField
          label="Search by name"
          type="search"
          value={view.search}
          onChange={({ target }) => setView({ search: target.value })}
          className="min-w-64"
        />
        <ShownSelect value={view.archived} onChange={(archived) => setView({ archived })} />
      </div>
      {rows.length === 0 ? (
        <EmptyState title="No plant matches" action={<Button onClick={() => setView(null)}>Show all plants</Button>}>
          {view.search === "" ? "There is nothing in this part of the list." : `No name here contains “${view.search}”.`}
        </EmptyState>
      ) : (
        <DataTable
          caption="Plants of the team"
          columns={columns}
          rows={rows}
          rowKey={({ id }) => id}
          sort={sortOf(view.sort)}
          onSort={(sort) => setView({ sort: sortText(sort) })}
        />
      )}
      <ShowMore list={plants} />
    </>
  );
}

const sortOf = (text: (typeof SORTS)[number]): Sort => ({ column: text.replace("-", ""), descending: text.startsWith("-") });
const sortText = ({ column, descending }: Sort) =>
  SORTS.find((text) => text === `${descending ? "-" : ""}${column}`) ?? "-updated";
