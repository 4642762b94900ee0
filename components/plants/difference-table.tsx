import type { PlantDifference } from "@/lib/schemas/plant";
import { type Column, DataTable } from "../ui/data-table";

type Change = PlantDifference["changes"][number];

const text = (value: string | null) => (value === null ? <span className="text-soft">absent</span> : <code>{value}</code>);

export function DifferenceTable({ difference }: Readonly<{ difference: PlantDifference }>) {
  const { from, to, changes } = difference;
  const columns: readonly Column<Change>[] = [
    { key: "place", header: "Where", cell: ({ place }) => place },
    { key: "before", header: `Revision ${from.number}`, cell: ({ before }) => text(before) },
    { key: "after", header: `Revision ${to.number}`, cell: ({ after }) => text(after) },
  ];
  if (changes.length === 0) return <p>The two revisions hold the same plant.</p>;
  return (
    <DataTable
      caption={`What differs between revisions ${from.number} and ${to.number}`}
      columns={columns}
      rows={changes}
      rowKey={({ pointer }) => pointer}
    />
  );
}
