"use client";

import { X } from "lucide-react";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { AxisSample } from "../../plots/axis-bar";
import { Button } from "../../ui/button";
import { SheetSection } from "../../ui/sheet-section";
import { TextField } from "../../ui/text-field";
import { removeAxis } from "./plant-document";
import { fieldProblem } from "./use-evaluation";
import type { PlantDraft } from "./use-plant-draft";

type AxesTableProps = Readonly<{ draft: PlantDraft; evaluation: PlantEvaluation | null; readOnly: boolean }>;

/** Each axis has its hue and dash by its place, the same in every table, matrix and plot. */
export function AxesTable({ draft, evaluation, readOnly }: AxesTableProps) {
  const { content, set } = draft;
  const change = (index: number, part: { name?: string; tag?: string }) =>
    set((now) => ({ ...now, axes: now.axes.map((axis, place) => (place === index ? { ...axis, ...part } : axis)) }));
  const add = () =>
    set((now) => ({ ...now, axes: [...now.axes, { name: `axis ${now.axes.length + 1}`, tag: String(now.axes.length + 1) }] }));
  const places = content.axes.map((axis, index) => ({ key: `axis ${index + 1}`, axis, index }));
  return (
    <SheetSection
      title="Axes"
      note="a degree of freedom of the machine: its states, inputs and outputs share one hue and one dash"
      actions={
        readOnly ? null : (
          <Button size="small" onClick={add}>
            Add axis
          </Button>
        )
      }
    >
      {places.length === 0 ? <p className="text-soft">None.</p> : null}
      <ul className="flex flex-col gap-2">
        {places.map(({ key, axis, index }) => (
          <li key={key} className="flex flex-wrap items-start gap-3">
            <span className="flex min-h-9 items-center">
              <AxisSample axis={index} />
            </span>
            <TextField
              label={`Name of axis ${index + 1}`}
              hideLabel
              className="w-56"
              value={axis.name}
              readOnly={readOnly}
              maxLength={40}
              problem={fieldProblem(evaluation, `/axes/${index}/name`)}
              onChange={({ target }) => change(index, { name: target.value })}
            />
            <TextField
              label={`Tag of axis ${index + 1}`}
              hideLabel
              className="w-20"
              value={axis.tag}
              readOnly={readOnly}
              maxLength={4}
              problem={fieldProblem(evaluation, `/axes/${index}/tag`)}
              onChange={({ target }) => change(index, { tag: target.value })}
            />
            {readOnly ? null : (
              <Button
                tone="quiet"
                aria-label={`Remove axis ${axis.name || index + 1}`}
                onClick={() => set((now) => removeAxis(now, index))}
              >
                <X aria-hidden size={16} />
              </Button>
            )}
          </li>
        ))}
      </ul>
    </SheetSection>
  );
}
