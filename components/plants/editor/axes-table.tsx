"use client";

import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { AxisSample } from "../../plots/axis-bar";
import { EditorField } from "./editor-field";
import { EditorSection } from "./editor-section";
import { removeAxis } from "./plant-document";
import { RowButton } from "./row-button";
import { fieldProblem } from "./use-evaluation";
import type { PlantDraft } from "./use-plant-draft";

type AxesTableProps = Readonly<{ draft: PlantDraft; evaluation: PlantEvaluation | null; readOnly: boolean }>;

const TEXTS = [
  { field: "name", header: "Name", width: "w-56", limit: 40 },
  { field: "tag", header: "Tag", width: "w-20", limit: 4 },
] as const;

/** Each axis has its hue and dash by its place, the same in every table, matrix and plot. */
export function AxesTable({ draft, evaluation, readOnly }: AxesTableProps) {
  const { content, set } = draft;
  const change = (index: number, part: { name?: string; tag?: string }) =>
    set((now) => ({ ...now, axes: now.axes.map((axis, place) => (place === index ? { ...axis, ...part } : axis)) }));
  const add = () =>
    set((now) => ({ ...now, axes: [...now.axes, { name: `axis ${now.axes.length + 1}`, tag: String(now.axes.length + 1) }] }));
  const places = content.axes.map((axis, index) => ({ key: `axis ${index + 1}`, axis, index }));
  return (
    <EditorSection
      title="Axes"
      note="a degree of freedom of the machine: its states, inputs and outputs share one hue and one dash"
      one="axis"
      onAdd={readOnly ? undefined : add}
      none="None."
      count={places.length}
    >
      <ul className="flex flex-col gap-2">
        {places.map(({ key, axis, index }) => (
          <li key={key} className="flex flex-wrap items-start gap-3">
            <span className="flex min-h-9 items-center">
              <AxisSample axis={index} />
            </span>
            {TEXTS.map(({ field, header, width, limit }) => (
              <EditorField
                key={field}
                label={`${header} of axis ${index + 1}`}
                className={width}
                value={axis[field]}
                readOnly={readOnly}
                maxLength={limit}
                problem={fieldProblem(evaluation, `/axes/${index}/${field}`)}
                onChange={(text) => change(index, { [field]: text })}
              />
            ))}
            {readOnly ? null : (
              <RowButton
                act="remove"
                name={`axis ${axis.name || index + 1}`}
                onClick={() => set((now) => removeAxis(now, index))}
              />
            )}
          </li>
        ))}
      </ul>
    </EditorSection>
  );
}
