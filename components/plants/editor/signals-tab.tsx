"use client";

import type { PlantEvaluation } from "@/control/plant/evaluate-plant";
import { RadioGroup } from "../../ui/radio-group";
import { AxesTable } from "./axes-table";
import { outputsCommanded, ownCommanded } from "./plant-document";
import type { NumberColumn } from "./signal-row";
import { SignalTable } from "./signal-table";
import type { PlantDraft } from "./use-plant-draft";

type SignalsTabProps = Readonly<{ draft: PlantDraft; evaluation: PlantEvaluation | null; readOnly: boolean }>;

const SCALE: NumberColumn = { field: "scale", header: "Largest acceptable deviation" };
const LIMITS: readonly NumberColumn[] = [
  { field: "lower", header: "Lower limit" },
  { field: "upper", header: "Upper limit" },
];
const AMPLITUDE: NumberColumn = { field: "amplitude", header: "Test amplitude", whenEmpty: 0 };

/** The lists that have a place in the operating point. */
const OPERATED = [
  { list: "states", one: "state", title: "States", note: "in the order of A", numbers: [SCALE] },
  {
    list: "inputs",
    one: "input",
    title: "Inputs",
    note: "actuators; limits are absolute, not deviations",
    numbers: [SCALE, ...LIMITS],
  },
  { list: "outputs", one: "output", title: "Outputs", note: "what is measured", numbers: [SCALE] },
] as const;

export function SignalsTab({ draft, evaluation, readOnly }: SignalsTabProps) {
  const shared = { draft, evaluation, readOnly };
  const { content, set } = draft;
  const own = content.commanded !== null;
  return (
    <>
      <AxesTable {...shared} />
      {OPERATED.map((table) => (
        <SignalTable key={table.list} {...shared} {...table} operating={table.list} />
      ))}
      <div className="mb-4">
        <RadioGroup
          legend="Commanded quantities"
          name="commanded"
          value={own ? "own" : "outputs"}
          disabled={readOnly}
          onChange={(value) => set((now) => (value === "own" ? ownCommanded(now) : outputsCommanded(now)))}
          choices={[
            { value: "outputs", label: "the outputs" },
            { value: "own", label: "a list of their own", hint: "where what is commanded is not what is measured" },
          ]}
        />
      </div>
      {own ? (
        <SignalTable
          {...shared}
          list="commanded"
          one="commanded quantity"
          title="Commanded quantities"
          note="the columns of the response grid; the test amplitude is the step of each"
          numbers={[AMPLITUDE]}
        />
      ) : null}
      <SignalTable
        {...shared}
        list="disturbances"
        one="disturbance"
        title="Disturbances"
        note="forces and flows that nobody commands"
        numbers={[SCALE]}
      />
    </>
  );
}
