import type { GainEvidence } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import { formatNumber, formatSeconds } from "@/control/words/format-number";
import type { ResponseCurves, ResponseFigures } from "@/lib/schemas/evidence";
import { responsePicture } from "../designs/responses/response-rows";
import { headersOf } from "../designs/signal-headers";
import { WovenMatrix } from "../matrix/woven-matrix";
import { ResponseGrid } from "../plots/response-grid";

type ShownSheetProps = Readonly<{
  model: PlantModel;
  gains: GainEvidence;
  curves: readonly ResponseCurves[];
  figures: ResponseFigures;
}>;

/** A real design of a small invented machine, drawn by the same parts as everybody's. */
export function ShownSheet({ model, gains, curves, figures }: ShownSheetProps) {
  const picture = responsePicture(
    { model, curves, ghosts: [], figures: figures.figures },
    { kind: "step", loop: "full-state", roles: ["commanded", "input"] },
  );
  return (
    <section aria-labelledby="shown-design" className="min-w-0 border border-ink bg-paper">
      <div className="px-5 pt-3 pb-4">
        <div className="mb-2 flex flex-wrap items-baseline gap-x-3">
          <h2 id="shown-design">A mirror head that tips and tilts</h2>
          <p className="text-sm text-soft">columns: axis commanded · rows: what the machine does</p>
        </div>
        {picture ? <ResponseGrid caption="Coupled response of the mirror head" {...picture} /> : null}
        <div className="mt-4">
          <WovenMatrix
            name="K"
            caption="the gain, u = −K x + F r"
            note="hatched where one axis acts on another"
            rows={headersOf(model.inputs)}
            columns={headersOf(model.states)}
            values={gains.K}
            copy={false}
          />
        </div>
      </div>
      <TitleBlock gains={gains} figures={figures} model={model} />
    </section>
  );
}

/** The block in the corner of a drawing: what this is and how far it can be trusted. */
function TitleBlock({ model, gains, figures }: Omit<ShownSheetProps, "curves">) {
  const { worstSettling, worstCrossPeak } = figures.summary.fullState;
  const cross = worstCrossPeak ? model.commanded[worstCrossPeak.signal] : null;
  const facts: readonly (readonly [string, string])[] = [
    ["machine", "invented"],
    ["recipe", "quadratic weights"],
    ["settles within", worstSettling === null ? "–" : formatSeconds(worstSettling)],
    [
      "cross-axis peak",
      worstCrossPeak && cross ? `${formatNumber(worstCrossPeak.peak * cross.amplitude, 3)} ${cross.unit}` : "–",
    ],
    ["Riccati residual", formatNumber(gains.residual, 2)],
  ];
  return (
    <dl className="flex flex-wrap border-t border-ink bg-sheet text-table">
      {facts.map(([term, figure]) => (
        <div key={term} className="flex-1 border-r border-rule px-3 py-1.5 last:border-r-0">
          <dt className="text-xs whitespace-nowrap text-soft">{term}</dt>
          <dd className="font-mono whitespace-nowrap">{figure}</dd>
        </div>
      ))}
    </dl>
  );
}
