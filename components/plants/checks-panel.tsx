"use client";

import type { PlantModel } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import type { ChecksReply } from "@/lib/schemas/evidence";
import { WovenMatrix } from "../matrix/woven-matrix";
import { Disclosure } from "../ui/disclosure";
import { Notice } from "../ui/notice";
import { ComplexNum, Num } from "../ui/num";
import { ModesTable } from "./modes-table";

type ChecksPanelProps = Readonly<{ checks: ChecksReply; model: PlantModel }>;

/** What the plant lets a feedback do, in plain words first and in numbers below. */
export function ChecksPanel({ checks, model }: ChecksPanelProps) {
  const { findings, modes, zeros, coupling } = checks;
  return (
    <div className="flex flex-col gap-6">
      <ul className="grid gap-3 lg:grid-cols-2">
        {findings.map(({ key, tone, headline, sentence }) => (
          <li key={key}>
            <Notice kind={tone === "not-met" ? "unmet" : tone} title={`${headline}.`}>
              {sentence}
            </Notice>
          </li>
        ))}
      </ul>
      {modes.state === "computed" ? (
        <ModesTable modes={modes.value} labels={checks.modeLabels} model={model} />
      ) : (
        <Notice kind="unmet" title={modes.title}>
          {modes.sentence} {modes.nextStep}
        </Notice>
      )}
      <Disclosure summary="Zeros, ranks, coupling and scaling in numbers">
        <div className="mt-3 flex flex-col gap-5">
          <Zeros zeros={zeros} />
          <Rank title="Controllability" part={checks.controllability} model={model} />
          <Rank title="Observability" part={checks.observability} model={model} />
          {coupling.state === "computed" ? <Coupling value={coupling.value} model={model} /> : null}
          <p>
            Entries spread over a factor of <Num value={checks.scaling.spreadAsGiven} /> as given and of{" "}
            <Num value={checks.scaling.spreadScaled} /> after scaling by the largest acceptable deviations.
          </p>
        </div>
      </Disclosure>
    </div>
  );
}

function Zeros({ zeros }: Readonly<{ zeros: ChecksReply["zeros"] }>) {
  if (zeros.state === "refused") return <p>{`Transmission zeros: ${zeros.sentence} ${zeros.nextStep}`}</p>;
  if (zeros.value.length === 0) return <p>Transmission zeros from the inputs to the outputs: none.</p>;
  return (
    <div>
      <h3 className="font-semibold">Transmission zeros from the inputs to the outputs</h3>
      <ul className="mt-1 flex flex-wrap gap-x-6">
        {zeros.value.map(({ value, minimumPhase }) => (
          <li key={`${value.re} ${value.im}`}>
            <ComplexNum value={value} /> {minimumPhase ? "" : "(limits how fast any feedback can be)"}
          </li>
        ))}
      </ul>
    </div>
  );
}

type RankProps = Readonly<{ title: string; part: ChecksReply["controllability"]; model: PlantModel }>;

function Rank({ title, part, model }: RankProps) {
  if (part.state === "refused") return <p>{`${title}: ${part.sentence} ${part.nextStep}`}</p>;
  const { rank, full, tolerance, singularValues, weakestDirection, weakestValue } = part.value;
  const direction = model.states
    .map(({ name }, index) => ({ name, share: weakestDirection[index] ?? 0 }))
    .filter(({ share }) => Math.abs(share) > 0.1)
    .sort((a, b) => Math.abs(b.share) - Math.abs(a.share))
    .map(({ name, share }) => `${formatNumber(share, 2)} ${name}`);
  return (
    <div>
      <h3 className="font-semibold">{title}</h3>
      <p>
        Rank <Num value={rank} /> of <Num value={full} />; smallest singular value <Num value={weakestValue} /> against the
        tolerance <Num value={tolerance} />. Weakest direction: {direction.join(", ")} (scaled states).
      </p>
      <p className="text-sm text-soft">
        Singular values of the deciding step: {singularValues.map((value) => formatNumber(value, 3)).join(", ") || "none"}
      </p>
    </div>
  );
}

type CouplingValue = Extract<ChecksReply["coupling"], { state: "computed" }>["value"];

function Coupling({ value, model }: Readonly<{ value: CouplingValue; model: PlantModel }>) {
  const axes = [...model.axes.map(({ name }, axis) => ({ label: name, axis })), { label: "no axis", axis: null }];
  const shown = axes.slice(0, value.blocks.length);
  const { relativeGain } = value;
  return (
    <div className="grid gap-5 lg:grid-cols-2">
      <WovenMatrix
        name="Coupling"
        caption="share of A in each block, after scaling"
        note="rows: axis acted on · columns: axis acting"
        rows={shown}
        columns={shown}
        values={value.blocks}
        scaling="form"
      />
      {relativeGain ? (
        <WovenMatrix
          name="Relative gain"
          caption="at rest, from inputs to commanded quantities"
          note="1 on a pair: the other loops do not disturb it"
          rows={model.commanded.map(({ name, axis }) => ({ label: name, axis }))}
          columns={model.inputs.map(({ name, axis }) => ({ label: name, axis }))}
          values={relativeGain}
          scaling="form"
        />
      ) : null}
    </div>
  );
}
