"use client";

import Link from "next/link";
import { useMemo } from "react";
import { judgeCriteria, type Verdict } from "@/control/design/criteria";
import { criterionLimit, criterionSubject, criterionValue, unjudgedWords } from "@/control/words/describe-criterion";
import { STATE_WORD, StateMark } from "../../ui/state-mark";
import { useAtMostEvery } from "../../ui/use-at-most-every";
import type { BenchStart, Solved } from "../bench/bench-types";
import { EvidencePart } from "./evidence-part";
import { computed } from "./figures-reply";

const ANNOUNCE_EVERY_MS = 1000;
/** Where the plant's page keeps its criteria. */
const criteriaPath = (plantId: string) => `/plants/${plantId}?tab=criteria`;

type AcceptancePartProps = Readonly<{ plant: Pick<BenchStart["plant"], "id" | "criteria">; solved: Solved }>;

/** Each criterion of the plant against the design as it was solved last, by the function that judges the stored one. */
export function AcceptancePart({ plant: { id, criteria }, solved: { evidence, ground } }: AcceptancePartProps) {
  const responses = computed(evidence.responses);
  const verdicts = useMemo(() => judgeCriteria(criteria, responses, ground.model), [criteria, responses, ground]);
  if (criteria.length === 0) {
    return (
      <EvidencePart title="Acceptance">
        <p className="text-table text-soft">
          The plant has no acceptance criteria yet. They are set <Link href={criteriaPath(id)}>on its page</Link>.
        </p>
      </EvidencePart>
    );
  }
  return (
    <EvidencePart title="Acceptance">
      <MetCount verdicts={verdicts} />
      <ul aria-label="Acceptance criteria" className="divide-y divide-rule border-y border-rule text-table">
        {verdicts.map((verdict) => (
          <VerdictLine key={`${verdict.criterion.kind} ${verdict.criterion.signal}`} verdict={verdict} />
        ))}
      </ul>
      <p className="text-sm text-soft">
        {evidence.observer.state === "computed" ? "Judged with the observer in the loop. " : ""}
        <Link href={criteriaPath(id)}>Criteria of the plant</Link>
      </p>
    </EvidencePart>
  );
}

function MetCount({ verdicts }: Readonly<{ verdicts: readonly Verdict[] }>) {
  const met = verdicts.filter((verdict) => verdict.met).length;
  const said = `${met} of ${verdicts.length} met`;
  const announced = useAtMostEvery(ANNOUNCE_EVERY_MS, said);
  return (
    <>
      <p aria-hidden="true" className="flex items-center gap-1.5 font-semibold">
        <StateMark kind={met === verdicts.length ? "met" : "unmet"} />
        {said}
      </p>
      <p role="status" className="sr-only">
        Acceptance criteria: {announced}
      </p>
    </>
  );
}

function VerdictLine({ verdict }: Readonly<{ verdict: Verdict }>) {
  const kind = verdict.met ? "met" : "unmet";
  const value = criterionValue(verdict);
  return (
    <li className="py-1">
      <p className="flex items-baseline gap-1.5">
        <StateMark kind={kind} />
        <span>
          <strong className="font-semibold">{STATE_WORD[kind]}</strong>, {criterionSubject(verdict.criterion)}
        </span>
      </p>
      <p className="pl-5">
        {value === null ? `${unjudgedWords(verdict)}; ` : <span className="font-mono">{value}</span>}
        <span className="text-soft">
          {value === null ? "" : ", "}at most <span className="font-mono">{criterionLimit(verdict.criterion)}</span>
        </span>
      </p>
    </li>
  );
}
