"use client";

import type { ReactNode } from "react";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { AxisBar } from "../../plots/axis-bar";
import { NumberField } from "../../ui/number-field";
import { Select } from "../../ui/select";
import { EditorField } from "./editor-field";
import { changeSignal, moveSignal, removeSignal, type SignalList, withOperatingValue } from "./plant-document";
import { RowButton } from "./row-button";
import { fieldProblem } from "./use-evaluation";
import type { PlantDraft } from "./use-plant-draft";

const TEXTS = [
  { field: "name", header: "Name", width: "min-w-32", limit: 40 },
  { field: "unit", header: "Unit", width: "min-w-24", limit: 24 },
] as const;

export type NumberColumn = {
  readonly field: "scale" | "lower" | "upper" | "amplitude";
  readonly header: string;
  /** Where an empty field cannot mean "none". */
  readonly whenEmpty?: number;
};

export type AnySignal = { readonly name: string; readonly unit: string; readonly axis: number | null } & Partial<
  Record<NumberColumn["field"], number | null>
>;

export type SignalTableProps = Readonly<{
  list: SignalList;
  one: string;
  title: string;
  note: ReactNode;
  numbers: readonly NumberColumn[];
  /** States, inputs and outputs have a place in the operating point. */
  operating?: "states" | "inputs" | "outputs";
  draft: PlantDraft;
  evaluation: PlantEvaluation | null;
  readOnly: boolean;
}>;

type SignalRowProps = SignalTableProps & Readonly<{ signal: AnySignal; index: number; last: number }>;

export function SignalRow({ list, one, numbers, operating, draft, evaluation, readOnly, signal, index, last }: SignalRowProps) {
  const { content, set } = draft;
  const at = (field: string) => fieldProblem(evaluation, `/${list}/${index}/${field}`);
  const change = (part: Readonly<Record<string, unknown>>) => set((now) => changeSignal(now, list, index, part));
  const label = (what: string) => `${what} of ${one} ${index + 1}${signal.name ? `, ${signal.name}` : ""}`;
  return (
    <tr className="border-b border-rule align-top">
      {TEXTS.map(({ field, header, width, limit }) => (
        <td key={field} className={`${width} px-2 py-1.5`}>
          <EditorField
            label={label(header)}
            value={signal[field]}
            readOnly={readOnly}
            maxLength={limit}
            problem={at(field)}
            onChange={(text) => change({ [field]: text })}
          />
        </td>
      ))}
      <td className="min-w-36 px-2 py-1.5">
        <div className="flex items-center gap-2">
          <AxisBar axis={signal.axis} />
          <Select
            label={label("Axis")}
            hideLabel
            className="flex-1"
            value={signal.axis === null ? "" : String(signal.axis)}
            disabled={readOnly}
            problem={at("axis")}
            onChange={({ target }) => change({ axis: target.value === "" ? null : Number(target.value) })}
            options={[
              { value: "", label: "none" },
              ...content.axes.map(({ name }, axis) => ({ value: String(axis), label: name || `axis ${axis + 1}` })),
            ]}
          />
        </div>
      </td>
      {numbers.map(({ field, header, whenEmpty }) => (
        <td key={field} className="min-w-32 px-2 py-1.5">
          <NumberField
            label={label(header)}
            hideLabel
            unit={signal.unit}
            value={signal[field] ?? null}
            disabled={readOnly}
            problem={at(field)}
            onChange={(value) => change({ [field]: value ?? whenEmpty ?? null })}
          />
        </td>
      ))}
      {operating ? (
        <OperatingCell {...{ list: operating, label: label("Operating point"), unit: signal.unit, draft, index, readOnly }} />
      ) : null}
      <td className="px-1 py-1.5 whitespace-nowrap">
        {readOnly ? null : <RowActions {...{ list, name: `${one} ${signal.name || index + 1}`, set, index, last }} />}
      </td>
    </tr>
  );
}

type OperatingCellProps = Readonly<{
  list: "states" | "inputs" | "outputs";
  label: string;
  unit: string;
  draft: PlantDraft;
  index: number;
  readOnly: boolean;
}>;

function OperatingCell({ list, label, unit, draft, index, readOnly }: OperatingCellProps) {
  const { content, set } = draft;
  return (
    <td className="min-w-32 px-2 py-1.5">
      <NumberField
        label={label}
        hideLabel
        unit={unit}
        value={content.operatingPoint?.[list][index] ?? 0}
        disabled={readOnly}
        onChange={(value) => set((now) => withOperatingValue(now, list, index, value ?? 0))}
      />
    </td>
  );
}

type RowActionsProps = Readonly<{ list: SignalList; name: string; set: PlantDraft["set"]; index: number; last: number }>;

function RowActions({ list, name, set, index, last }: RowActionsProps) {
  return (
    <>
      <RowButton name={name} act="up" disabled={index === 0} onClick={() => set((now) => moveSignal(now, list, index, -1))} />
      <RowButton name={name} act="down" disabled={index === last} onClick={() => set((now) => moveSignal(now, list, index, 1))} />
      <RowButton name={name} act="remove" onClick={() => set((now) => removeSignal(now, list, index))} />
    </>
  );
}
