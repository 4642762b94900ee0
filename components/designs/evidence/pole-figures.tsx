import type { PlantModel } from "@/control/plant/model";
import { AxisBar } from "../../plots/axis-bar";
import { type PoleMark, PolePlane } from "../../plots/pole-plane";
import { ComplexNum } from "../../ui/num";
import { planeUnit, poleFigureText, slowFirst } from "./evidence-words";
import type { PolesReply } from "./figures-reply";

type PoleFiguresProps = Readonly<{ title: string; poles: PolesReply; model: PlantModel }>;

/** Poles as a list, slow ones first: main state, value, and what the trade reads off. */
export function PoleFigures({ title, poles, model }: PoleFiguresProps) {
  const unit = planeUnit(model.timeBase);
  const lines = slowFirst(poles).map((report, place) => ({ report, key: `place ${place}` }));
  return (
    <ul aria-label={title} className="divide-y divide-rule border-y border-rule text-table">
      {lines.map(({ report, key }) => {
        const state = report.mainState === null ? null : model.states[report.mainState];
        return (
          <li key={key} className="flex flex-wrap items-baseline justify-between gap-x-3 py-1">
            <span className="inline-flex items-baseline gap-2">
              {state ? (
                <>
                  <AxisBar axis={state.axis} />
                  mostly {state.name}
                </>
              ) : null}
            </span>
            <ComplexNum value={report.pole} unit={unit} />
            <span className="w-full text-right text-sm text-soft">{poleFigureText(report)}</span>
          </li>
        );
      })}
    </ul>
  );
}

const marksOf = (poles: PolesReply, kind: PoleMark["kind"], model: PlantModel): PoleMark[] =>
  poles.map(({ pole, mainState }, index) => {
    const state = mainState === null ? null : model.states[mainState];
    return { key: `${kind} ${index}`, pole, kind, axis: state?.axis ?? null, tag: state?.name ?? "" };
  });

type PlaneProps = PoleFiguresProps & Readonly<{ kind: PoleMark["kind"] }>;

/** The same poles in their plane. */
export function DesignPlane({ title, poles, model, kind }: PlaneProps) {
  return (
    <PolePlane title={title} poles={marksOf(poles, kind, model)} sampled={model.timeBase.kind === "sampled"} table={false} />
  );
}
