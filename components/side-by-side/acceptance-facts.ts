import {
  CRITERION_UNITS,
  criterionLimit,
  criterionSubject,
  criterionValue,
  unjudgedWords,
} from "@/control/words/describe-criterion";
import type { Acceptance } from "@/lib/schemas/criteria";
import type { Fact } from "./compared-rows";

const SECTION = "Acceptance criteria of the plant, as they stand now";

type Verdict = Acceptance["verdicts"][number];

/** The word says it; the mark beside it is for the eye. */
function verdictFact(verdict: Verdict): Fact {
  const { criterion, value, met } = verdict;
  const { kind, signal } = criterion;
  const text = `${met ? "met" : "not met"}, ${criterionValue(verdict) ?? unjudgedWords(verdict)}`;
  return {
    ...{ section: SECTION, text, exact: text },
    key: `criterion ${kind} ${signal ?? ""}`,
    label: `${criterionSubject(criterion)}, at most ${criterionLimit(criterion)}`,
    mark: { kind: met ? "met" : "unmet", word: "" },
    data: value === null ? [] : [{ what: "", unit: CRITERION_UNITS[kind], value }],
  };
}

/** How many criteria a design meets, and each of them: rows that all designs of a plant share. */
export function acceptanceFacts({ met, of, verdicts }: Acceptance): Fact[] {
  if (of === 0) return [];
  const text = `${met} of ${of}`;
  return [
    {
      ...{ section: SECTION, key: "criteria met", label: "criteria met", text, exact: text },
      mark: { kind: met === of ? "met" : "unmet", word: "" },
      size: of - met,
      sort: { key: "criteria", words: "criteria that are not met" },
      data: [{ what: "met", unit: "1", value: met }],
    },
    ...verdicts.map(verdictFact),
  ];
}
