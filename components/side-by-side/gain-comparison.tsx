import { WovenMatrix } from "../matrix/woven-matrix";
import { AxisSample } from "../plots/axis-bar";
import { designDash } from "../plots/axis-style";
import { Cautions } from "../ui/cautions";
import { SheetSection } from "../ui/sheet-section";
import type { Compared } from "./compare-types";
import { type GainView, gainView } from "./gain-difference";

/** Each gain in the same weave, and what each changes against the first. */
export function GainComparison({ designs }: Readonly<{ designs: readonly Compared[] }>) {
  const [first] = designs;
  return (
    <SheetSection
      title="Gains K"
      note="u = −K x + F r · underlined: not the first design's · below each: its change against the first"
      ruled
    >
      <div className="flex flex-col gap-8">
        {designs.map((design, place) => (
          <DesignGain key={design.id} design={design} place={place} view={gainView(first, design)} />
        ))}
      </div>
      <div className="mt-6">
        <Cautions />
      </div>
    </SheetSection>
  );
}

type DesignGainProps = Readonly<{ design: Compared; place: number; view: GainView | null }>;

function DesignGain({ design: { designName }, place, view }: DesignGainProps) {
  return (
    <section aria-label={`Gain of ${designName}`} className="break-inside-avoid">
      <h3 className="mb-2 flex items-center gap-2 text-table font-semibold">
        <AxisSample axis={null} dash={designDash(place)} />
        {designName}
      </h3>
      {view ? (
        <div className="flex flex-wrap gap-x-10 gap-y-4">
          <WovenMatrix
            name="K"
            caption={designName}
            rows={view.rows}
            columns={view.columns}
            values={view.values}
            copy={false}
            marked={(r, c) => place > 0 && view.differs[r][c]}
          />
          {place > 0 ? <Change view={view} /> : null}
        </div>
      ) : (
        <p className="text-soft">It has no gain: its solution was refused.</p>
      )}
    </section>
  );
}

function Change({ view: { change, rows, columns } }: Readonly<{ view: GainView }>) {
  if (!change)
    return (
      <p className="max-w-64 self-center text-sm text-soft">
        Its signals are not the first design's, so there is no difference entry by entry.
      </p>
    );
  if (change.every((row) => row.every((value) => value === 0)))
    return <p className="self-center text-sm text-soft">The same gain as the first.</p>;
  return <WovenMatrix name="ΔK" caption="less the first's" rows={rows} columns={columns} values={change} copy={false} />;
}
