import Link from "next/link";
import { formatSeconds } from "@/control/words/format-number";
import type { DesignSummary } from "@/lib/schemas/design";
import { Chip } from "../ui/chip";
import type { Column } from "../ui/data-table";
import { StateMark } from "../ui/state-mark";
import { percentText } from "./percent-text";
import { METHOD_WORDS, OBSERVER_WORDS } from "./recipe/recipe-words";

type Figures = NonNullable<DesignSummary["summary"]>;

const none = <span className="text-soft">–</span>;
const figure =
  (text: (summary: Figures) => string | null) =>
  ({ summary }: DesignSummary) =>
    (summary && text(summary)) ?? none;

/** Largest effort over its limit, of all inputs; null where no input has a limit. */
export function worstOverLimit({ peakEffort }: Figures): number | null {
  const shares = peakEffort.flatMap(({ overLimit }) => (overLimit === null ? [] : [overLimit]));
  return shares.length === 0 ? null : shares.reduce((most, share) => Math.max(most, share));
}

const percent = (value: number | null) => (value === null ? null : percentText(value));

function Effort({ summary }: DesignSummary) {
  const share = summary && worstOverLimit(summary);
  if (share === null) return none;
  return (
    <span className="inline-flex items-baseline gap-1.5">
      {share > 1 ? <StateMark kind="unmet" word="Beyond its limit: " /> : null}
      {percentText(100 * share)}
    </span>
  );
}

const sortable =
  (value: (summary: Figures) => number | null | undefined) =>
  ({ summary }: DesignSummary) =>
    (summary && value(summary)) ?? null;

/** What a list of designs says about each; figures are the worst over everything commanded. */
export const DESIGN_COLUMNS: readonly Column<DesignSummary>[] = [
  {
    key: "name",
    header: "Design",
    sortBy: ({ name }) => name,
    cell: ({ id, plantId, name, outdated, plantRevision, archivedAt }) => (
      <span className="inline-flex flex-wrap items-baseline gap-x-2 gap-y-1">
        <Link href={`/plants/${plantId}/designs/${id}`} className="font-semibold">
          {name}
        </Link>
        {outdated ? <Chip kind="caution">outdated, on plant revision {plantRevision.number}</Chip> : null}
        {archivedAt ? <Chip>archived</Chip> : null}
      </span>
    ),
  },
  { key: "method", header: "Method", sortBy: ({ method }) => method, cell: ({ method }) => METHOD_WORDS[method] },
  { key: "observer", header: "Observer", sortBy: ({ observer }) => observer, cell: ({ observer }) => OBSERVER_WORDS[observer] },
  { key: "revision", header: "Revision", kind: "figure", cell: ({ currentRevision }) => currentRevision.number },
  {
    key: "settling",
    header: "Settling, 2 %",
    kind: "figure",
    sortBy: sortable(({ worstSettling }) => worstSettling),
    cell: figure(({ worstSettling }) => (worstSettling === null ? null : formatSeconds(worstSettling))),
  },
  {
    key: "overshoot",
    header: "Overshoot",
    kind: "figure",
    sortBy: sortable(({ worstOvershoot }) => worstOvershoot),
    cell: figure(({ worstOvershoot }) => percent(worstOvershoot)),
  },
  {
    key: "cross",
    header: "Cross-axis peak",
    kind: "figure",
    sortBy: sortable(({ worstCrossPeak }) => worstCrossPeak?.peak),
    cell: figure(({ worstCrossPeak }) => worstCrossPeak && percentText(100 * worstCrossPeak.peak)),
  },
  {
    key: "effort",
    header: "Peak effort of limit",
    kind: "figure",
    sortBy: sortable(worstOverLimit),
    cell: Effort,
  },
];
