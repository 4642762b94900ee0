"use client";

import { commandedOf, type MatrixName, matricesOf } from "@/control/plant/content-shape";
import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { TextArea } from "../../ui/text-area";
import { MatrixField } from "./matrix-field";
import { asHeader, drivenStates } from "./matrix-headers";
import { TimeBaseField } from "./time-base-field";
import type { PlantDraft } from "./use-plant-draft";

type ModelTabProps = Readonly<{ draft: PlantDraft; evaluation: PlantEvaluation | null; readOnly: boolean }>;

/** The matrices, woven by axis. Those that most plants leave at zero open on request. */
export function ModelTab({ draft, evaluation, readOnly }: ModelTabProps) {
  const { content, set, undo, redo } = draft;
  const { states, inputs, outputs, disturbances, timeBase } = content;
  const continuous = timeBase.kind === "continuous";
  const driven = drivenStates(content);
  const [x, u, y, w, z] = [states, inputs, outputs, disturbances, commandedOf(content)].map((list) => list.map(asHeader));
  const matrices = matricesOf(content);
  const field = (name: MatrixName) => ({
    name,
    entries: matrices[name].entries,
    evaluation,
    readOnly,
    history: { undo, redo },
    onChange: (entries: string[][]) => set((now) => ({ ...now, [name]: entries })),
  });
  return (
    <div className="flex flex-col gap-8">
      <TimeBaseField value={timeBase} readOnly={readOnly} onChange={(next) => set((now) => ({ ...now, timeBase: next }))} />
      <MatrixField
        {...field("A")}
        caption="how the states drive each other"
        note={`rows: ${continuous ? "rate of change of" : "next value of"} · columns: because of · hatched where one axis acts on another`}
        rows={driven}
        columns={x}
      />
      <div className="grid gap-8 lg:grid-cols-2">
        <MatrixField {...field("B")} caption="what each actuator does" rows={driven} columns={u} />
        <MatrixField {...field("C")} caption="what each sensor reads" rows={y} columns={x} />
      </div>
      {disturbances.length > 0 ? (
        <MatrixField {...field("E")} caption="what each disturbance does" rows={driven} columns={w} />
      ) : null}
      {content.commanded ? <MatrixField {...field("H")} caption="what is commanded, of the states" rows={z} columns={x} /> : null}
      <details open={content.D !== null || content.J !== null}>
        <summary className="cursor-pointer font-semibold">
          Direct paths from inputs (D{content.commanded ? ", J" : ""}), zero in most machines
        </summary>
        <div className="mt-4 grid gap-8 lg:grid-cols-2">
          <MatrixField {...field("D")} caption="what a sensor reads of an input at once" rows={y} columns={u} />
          {content.commanded ? (
            <MatrixField {...field("J")} caption="what is commanded, of the inputs" rows={z} columns={u} />
          ) : null}
        </div>
      </details>
      <TextArea
        label="Where the numbers come from"
        optional
        hint="Measured, identified or calculated; at which operating point; how far they hold."
        value={content.source}
        readOnly={readOnly}
        maxLength={2000}
        onChange={({ target }) => set((now) => ({ ...now, source: target.value }))}
      />
    </div>
  );
}
