"use client";

import type { PlantContent } from "@/control/plant/content";
import { CRITERION_WORDS } from "@/control/words/describe-criterion";
import { NumberField } from "../../ui/number-field";
import { Select } from "../../ui/select";
import { RowButton } from "../editor/row-button";
import { type CriterionLine, KINDS, signalsOf, withKind } from "./criterion-lines";
import { type CriteriaEditing, limitId, signalId, signalPointer } from "./use-criteria";

type CriterionRowProps = Readonly<{ line: CriterionLine; index: number; content: PlantContent; editing: CriteriaEditing }>;

/** The list has no empty value of its own; a signal's name is never empty. */
const WORST = "";

/** One criterion: what is limited, of which signal, and how far. */
export function CriterionRow({ line, index, content, editing }: CriterionRowProps) {
  const { kind, signal, limit, key } = line;
  const { put, remove, setUsable, submit, limitProblem } = editing;
  const label = (what: string) => `${what} of criterion ${index + 1}`;
  const known = signalsOf(kind, content);
  const gone = signal !== null && !known.includes(signal) ? [{ value: signal, label: `${signal}, not in this plant` }] : [];
  return (
    <tr className="border-b border-rule align-top">
      <td className="min-w-44 px-2 py-1.5">
        <Select
          label={label("Kind")}
          hideLabel
          value={kind}
          onChange={({ target }) => put(withKind(line, target.value as CriterionLine["kind"], content))}
          options={KINDS.map((value) => ({ value, label: CRITERION_WORDS[value].name }))}
        />
      </td>
      <td className="min-w-44 px-2 py-1.5">
        <Select
          id={signalId(index)}
          label={label("Signal")}
          hideLabel
          value={signal ?? WORST}
          problem={submit.at(signalPointer(index))}
          onChange={({ target }) => put({ ...line, signal: target.value === WORST ? null : target.value })}
          options={[{ value: WORST, label: "worst of all" }, ...known.map((name) => ({ value: name, label: name })), ...gone]}
        />
      </td>
      <td className="min-w-64 px-2 py-1.5">
        <NumberField
          id={limitId(index)}
          label={label("Limit")}
          hideLabel
          unit={CRITERION_WORDS[kind].unit}
          value={limit}
          problem={limitProblem(line, index)}
          onChange={(value) => put({ ...line, limit: value })}
          onUsable={(usable) => setUsable(key, usable)}
        />
      </td>
      <td className="px-1 py-1.5">
        <RowButton act="remove" name={`criterion ${index + 1}`} onClick={() => remove(key)} />
      </td>
    </tr>
  );
}
