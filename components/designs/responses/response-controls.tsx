"use client";

import { formatSeconds } from "@/control/words/format-number";
import { Checkbox } from "../../ui/checkbox";
import { Segmented } from "../../ui/radio-group";
import type { GridWanted, LoopChoice, RowRole } from "./response-rows";
import { ROW_ROLES } from "./use-response-view";

type ResponseControlsProps = Readonly<{
  wanted: GridWanted;
  setKind: (kind: GridWanted["kind"]) => void;
  setLoop: (loop: LoopChoice) => void;
  setRow: (role: RowRole, shown: boolean) => void;
  hasObserver: boolean;
  /** Seconds. */
  horizon: number;
}>;

const ROW_LABELS: Readonly<Record<RowRole, string>> = {
  commanded: "Commanded",
  output: "Outputs",
  state: "States",
  input: "Effort",
};

/** Which responses are drawn: what starts them, which loop, which rows. */
export function ResponseControls({ wanted, setKind, setLoop, setRow, hasObserver, horizon }: ResponseControlsProps) {
  return (
    <div className="no-print mb-3 flex flex-wrap items-end gap-x-5 gap-y-2">
      <Segmented
        legend="Response to"
        hideLegend
        value={wanted.kind}
        onChange={setKind}
        choices={[
          { value: "step", label: "Steps" },
          { value: "initial", label: "Initial state" },
          { value: "disturbance", label: "Disturbances" },
        ]}
      />
      {hasObserver ? (
        <Segmented
          legend="Loop"
          hideLegend
          value={wanted.loop}
          onChange={setLoop}
          choices={[
            { value: "observer", label: "With observer" },
            { value: "full-state", label: "Full state" },
            { value: "both", label: "Both" },
          ]}
        />
      ) : null}
      <fieldset className="flex flex-wrap gap-x-4">
        <legend className="sr-only">Rows shown</legend>
        {ROW_ROLES.map((role) => (
          <Checkbox
            key={role}
            label={ROW_LABELS[role]}
            checked={wanted.roles.includes(role)}
            onChange={({ target }) => setRow(role, target.checked)}
          />
        ))}
      </fieldset>
      <span className="ml-auto font-mono text-sm text-soft">0 – {formatSeconds(horizon)}</span>
    </div>
  );
}
