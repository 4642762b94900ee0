import type { PlantModel } from "@/control/plant/model";
import { formatNumber } from "@/control/words/format-number";
import { headersOf } from "../designs/signal-headers";
import { WovenMatrix } from "../matrix/woven-matrix";
import { AxisTags } from "../plants/axis-tags";
import { drivenStates } from "../plants/editor/matrix-headers";
import { timeBaseText } from "../plants/time-base-text";
import { AxisBar } from "../plots/axis-bar";

type Signal = { readonly name: string; readonly unit: string; readonly axis: number | null };

/** The plant behind a template, at the suggested values. */
export function TemplatePlant({ model, source }: Readonly<{ model: PlantModel; source: string }>) {
  const states = headersOf(model.states);
  return (
    <>
      <dl className="mb-5 grid grid-cols-[auto_1fr] gap-x-5 gap-y-1.5 text-table">
        <Fact term="Axes">
          <AxisTags axes={model.axes} />
        </Fact>
        <Fact term="States">
          <Signals signals={model.states} />
        </Fact>
        <Fact term="Inputs">
          <Signals signals={model.inputs} more={(j) => limitsText(model, j)} />
        </Fact>
        <Fact term="Outputs">
          <Signals signals={model.outputs} />
        </Fact>
        <Fact term="Time base">{timeBaseText(model.timeBase)}</Fact>
        {source ? (
          <Fact term="Source">
            <span className="break-words whitespace-pre-line">{source}</span>
          </Fact>
        ) : null}
      </dl>
      <WovenMatrix
        name="A"
        caption="how the states drive each other"
        note="rows: rate of change of · columns: because of · at the suggested values"
        rows={drivenStates(model)}
        columns={states}
        values={model.A}
        copy={false}
      />
    </>
  );
}

function Fact({ term, children }: Readonly<{ term: string; children: React.ReactNode }>) {
  return (
    <div className="contents">
      <dt className="text-soft">{term}</dt>
      <dd className="min-w-0">{children}</dd>
    </div>
  );
}

function Signals({ signals, more }: Readonly<{ signals: readonly Signal[]; more?: (index: number) => string }>) {
  if (signals.length === 0) return <span className="text-soft">none</span>;
  return (
    <ul className="flex flex-wrap gap-x-4 gap-y-0.5">
      {signals.map(({ name, unit, axis }, index) => (
        <li key={name} className="flex items-baseline gap-1.5">
          <AxisBar axis={axis} />
          <span>
            {name}, {unit}
            {more?.(index)}
          </span>
        </li>
      ))}
    </ul>
  );
}

function limitsText({ inputs }: PlantModel, index: number): string {
  const { lower, upper } = inputs[index];
  if (lower === null && upper === null) return "";
  if (lower === null) return `, at most ${formatNumber(upper ?? 0)}`;
  return upper === null ? `, at least ${formatNumber(lower)}` : `, ${formatNumber(lower)} to ${formatNumber(upper)}`;
}
