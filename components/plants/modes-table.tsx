"use client";

import type { PlantModel } from "@/control/plant/model";
import { formatFrequency, formatSeconds } from "@/control/words/format-number";
import type { ChecksReply } from "@/lib/schemas/evidence";
import { type Column, DataTable } from "../ui/data-table";
import { ComplexNum, Num } from "../ui/num";
import { ShareBar } from "./share-bar";

type Mode = Extract<ChecksReply["modes"], { state: "computed" }>["value"][number];
type Row = { readonly key: string; readonly label: string; readonly mode: Mode };
type ModesTableProps = Readonly<{ modes: readonly Mode[]; labels: readonly string[]; model: PlantModel }>;

/** Names of what has a real share, the strongest first. */
function mainNames(shares: readonly number[], signals: readonly { readonly name: string }[]): string {
  const most = Math.max(...shares, 0);
  if (most === 0) return "nothing";
  return signals
    .map(({ name }, index) => ({ name, share: shares[index] ?? 0 }))
    .filter(({ share }) => share >= most / 3)
    .sort((a, b) => b.share - a.share)
    .slice(0, 3)
    .map(({ name }) => name)
    .join(", ");
}

export function ModesTable({ modes, labels, model }: ModesTableProps) {
  const { states, inputs, outputs, timeBase } = model;
  const mirrored = (pole: Mode["pole"]) => (pole.im === 0 ? null : " and its mirror");
  const columns: readonly Column<Row>[] = [
    { key: "mode", header: "Mode", cell: ({ label }) => label },
    {
      key: "pole",
      header: timeBase.kind === "continuous" ? "Pole, 1/s" : "Pole, z",
      cell: ({ mode: { pole } }) => (
        <>
          <ComplexNum value={pole} />
          <span className="sr-only">{mirrored(pole)}</span>
        </>
      ),
    },
    {
      key: "frequency",
      header: "Frequency",
      kind: "figure",
      cell: ({ mode: { naturalFrequency, pole } }) =>
        naturalFrequency === null || pole.im === 0 ? "–" : formatFrequency(naturalFrequency),
    },
    {
      key: "damping",
      header: "Damping",
      kind: "figure",
      cell: ({ mode: { damping, pole } }) => (damping === null || pole.im === 0 ? "–" : <Num value={damping} />),
    },
    { key: "time", header: "Time constant", kind: "figure", cell: ({ mode }) => timeText(mode) },
    { key: "moves", header: "Mostly moves", cell: ({ mode }) => mainNames(mode.participation, states) },
    {
      key: "steered",
      header: "Steered by",
      cell: ({ mode }) => (
        <ShareBar
          share={Math.max(...mode.inputShare, 0)}
          text={mode.controllable ? mainNames(mode.inputShare, inputs) : "no input"}
        />
      ),
    },
    {
      key: "seen",
      header: "Seen by",
      cell: ({ mode }) => (
        <ShareBar
          share={Math.max(...mode.outputShare, 0)}
          text={mode.observable ? mainNames(mode.outputShare, outputs) : "no output"}
        />
      ),
    },
  ];
  const rows = modes.map((mode, index) => ({ key: String(index), label: labels[index] ?? "", mode }));
  return <DataTable caption="Modes of the plant" columns={columns} rows={rows} rowKey={({ key }) => key} />;
}

function timeText({ timeConstant, marginal }: Mode): string {
  if (timeConstant === null || marginal) return "∞";
  return timeConstant < 0 ? `grows, ${formatSeconds(-timeConstant)}` : formatSeconds(timeConstant);
}
