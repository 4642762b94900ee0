import Link from "next/link";
import { AxisSample } from "../plots/axis-bar";
import { designDash, designDashName } from "../plots/axis-style";
import { Chip } from "../ui/chip";
import type { ComparedDesign } from "./compare-designs";

type ComparedHeadProps = Readonly<{ plantId: string; designs: readonly ComparedDesign[] }>;

/** The designs with the dash of their curves, each leading to itself at the revision compared. */
export function ComparedHead({ plantId, designs }: ComparedHeadProps) {
  const plantsDiffer = new Set(designs.map(({ plantRevision }) => plantRevision)).size > 1;
  return (
    <thead>
      <tr>
        <td className="sticky left-0 z-1 min-w-40 border-b border-rule bg-paper print:static print:min-w-0" />
        {designs.map(({ id, designId, name, number, plantRevision, outdated, place }) => (
          <th
            key={id}
            scope="col"
            style={{ width: `${84 / designs.length}%` }}
            className="min-w-44 border-b border-rule px-3 pb-2 text-left align-top font-normal print:min-w-0"
          >
            <span className="flex items-center gap-2">
              <AxisSample axis={null} dash={designDash(place)} />
              <Link href={`/plants/${plantId}/designs/${designId}?revision=${id}`} className="font-semibold">
                {name}
              </Link>
            </span>
            <span className="mt-0.5 block text-sm text-soft">
              revision {number}
              {plantsDiffer ? ` on plant revision ${plantRevision}` : ""}, curves {designDashName(place)}
            </span>
            {outdated ? (
              <span className="mt-1 block">
                <Chip kind="caution">outdated</Chip>
              </span>
            ) : null}
          </th>
        ))}
      </tr>
    </thead>
  );
}
