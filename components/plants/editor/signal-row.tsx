"use client";

import { ArrowDown, ArrowUp, X } from "lucide-react";
import type { ReactNode } from "react";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { AxisBar } from "../../plots/axis-bar";
import { Button } from "../../ui/button";
import { NumberField } from "../../ui/number-field";
import { Select } from "../../ui/select";
import { TextField } from "../../ui/text-field";
import { changeSignal, moveSignal, removeSignal, type SignalList, withOperatingValue } from "./plant-document";
import { fieldProblem } from "./use-evaluation";
import type { PlantDraft } from "./use-plant-draft";

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
      <td className="min-w-32 px-2 py-1.5">
        <TextField
          label={label("Name")}
          hideLabel
          value={signal.name}
          readOnly={readOnly}
          maxLength={40}
          problem={at("name")}
          onChange={({ target }) => change({ name: target.value })}
        />
      </td>
      <td className="min-w-24 px-2 py-1.5">
        <TextField
          label={label("Unit")}
          hideLabel
          value={signal.unit}
          readOnly={readOnly}
          maxLength={24}
          problem={at("unit")}
          onChange={({ target }) => change({ unit: target.value })}
        />
      </td>
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
      <Button
        size="small"
        tone="quiet"
        aria-label={`Move ${name} up`}
        disabled={index === 0}
        onClick={() => set((now) => moveSignal(now, list, index, -1))}
      >
        <ArrowUp aria-hidden size={16} />
      </Button>
      <Button
        size="small"
        tone="quiet"
        aria-label={`Move ${name} down`}
        disabled={index === last}
        onClick={() => set((now) => moveSignal(now, list, index, 1))}
      >
        <ArrowDown aria-hidden size={16} />
      </Button>
      <Button
        size="small"
        tone="quiet"
        aria-label={`Remove ${name}`}
        onClick={() => set((now) => removeSignal(now, list, index))}
      >
        <X aria-hidden size={16} />
      </Button>
    </>
  );
}
