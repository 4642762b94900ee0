import type { Criterion } from "@/control/design/criteria";
import { criterionLimit, criterionSubject } from "@/control/words/describe-criterion";

/** Criteria to be read: what is limited, and how far. */
export function CriteriaList({ label, criteria }: Readonly<{ label: string; criteria: readonly Criterion[] }>) {
  return (
    <ul aria-label={label} className="max-w-xl divide-y divide-rule border-y border-rule text-table">
      {criteria.map((criterion) => (
        <li key={`${criterion.kind} ${criterion.signal}`} className="flex flex-wrap justify-between gap-x-4 py-1">
          <span>{criterionSubject(criterion)}</span>
          <span>
            at most <span className="font-mono">{criterionLimit(criterion)}</span>
          </span>
        </li>
      ))}
    </ul>
  );
}
