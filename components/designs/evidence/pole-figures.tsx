import type { PlantModel } from "@/control/plant/model";
import { AxisBar } from "../../plots/axis-bar";
import { type PoleMark, PolePlane } from "../../plots/pole-plane";
import { ComplexNum } from "../../ui/num";
import { planeUnit, poleFigureText, slowFirst } from "./evidence-words";
import type { PolesReply } from "./figures-reply";

type PoleFiguresProps = Readonly<{ title: string; poles: PolesReply; model: PlantModel }>;

/** Poles as a list: value, main state, and what the trade reads off. */
export function PoleFigures({ title, poles, model }: PoleFiguresProps) {
  const unit = planeUnit(model.timeBase);
  return (
    <table className="w-full border-collapse text-table">
      <caption className="sr-only">{title}</caption>
      <thead>
        <tr className="border-b border-ink text-left text-sm text-soft">
          <th scope="col" className="py-1 font-normal">
            Mostly moves
          </th>
          <th scope="col" className="py-1 text-right font-normal">
            Pole{unit ? `, ${unit}` : ""}
          </th>
        </tr>
      </thead>
      <tbody>
        {slowFirst(poles).map((report) => {
          const state = report.mainState === null ? null : model.states[report.mainState];
          return (
            <tr key={`${report.pole.re} ${report.pole.im}`} className="border-b border-rule align-baseline">
              <th scope="row" className="py-1 pr-2 text-left font-normal">
                <span className="inline-flex items-baseline gap-2">
                  {state ? <AxisBar axis={state.axis} /> : null}
                  {state?.name ?? "–"}
                </span>
              </th>
              <td className="py-1 text-right">
                <ComplexNum value={report.pole} />
                <span className="block text-sm text-soft">{poleFigureText(report)}</span>
              </td>
            </tr>
          );
        })}
      </tbody>
    </table>
  );
}

const marksOf = (poles: PolesReply, kind: PoleMark["kind"], model: PlantModel): PoleMark[] =>
  poles.map(({ pole, mainState }, index) => {
    const state = mainState === null ? null : model.states[mainState];
    return { key: `${kind} ${index}`, pole, kind, axis: state?.axis ?? null, tag: state?.name ?? "" };
  });

type DesignPlaneProps = Readonly<{ poles: PolesReply; observer: PolesReply; model: PlantModel }>;

/** Closed-loop poles, and those of the observer, in one plane. */
export function DesignPlane({ poles, observer, model }: DesignPlaneProps) {
  const marks = [...marksOf(poles, "closed", model), ...marksOf(observer, "observer", model)];
  const title = observer.length > 0 ? "Loop (×) and observer (+)" : "Closed-loop poles";
  return <PolePlane title={title} poles={marks} sampled={model.timeBase.kind === "sampled"} table={false} />;
}
