"use client";

import { memo } from "react";
import { describeLaw, describeObserverLaw, describeTimeBase } from "@/control/words/describe-law";
import { gainFileAddress } from "@/lib/client/designs";
import { WovenMatrix } from "../../matrix/woven-matrix";
import { buttonStyle } from "../../ui/button-style";
import { Cautions } from "../../ui/cautions";
import { CopyButton } from "../../ui/copy-button";
import { SheetSection } from "../../ui/sheet-section";
import type { Solved } from "../bench/bench-types";
import { computed } from "../evidence/figures-reply";
import { type GainMatrix, gainMatrices } from "./gain-matrices";
import { gainText } from "./gain-text";
import { SpringReading } from "./spring-reading";

type GainsSectionProps = Readonly<{ solved: Solved; plantName: string; designName: string | null }>;

/** The numbers that leave for the machine: matrices in the weave, sign equation, time base, ways out, cautions. */
export const GainsSection = memo(function GainsSection({ solved, plantName, designName }: GainsSectionProps) {
  const { evidence, ground, source } = solved;
  const matrices = gainMatrices(evidence, ground.model);
  if (matrices.length === 0) return null;
  const observer = computed(evidence.observer);
  const gains = computed(evidence.gains);
  const law = describeLaw(computed(evidence.reference) !== null, observer !== null);
  const observerLaw = observer && describeObserverLaw(observer.kind, ground.model.timeBase);
  const timeBase = describeTimeBase(ground.model.timeBase);
  const stored = source.kind === "stored";
  const title = `${plantName}, revision ${ground.plantRevision.number}; ${designName ?? "new design"}, ${stored ? `revision ${source.number}` : "not saved"}`;
  const waysOut = (
    <>
      <CopyButton label="Copy with names and units" text={() => gainText({ title, law, observerLaw, timeBase, matrices })} />
      <Downloads solved={solved} />
    </>
  );
  return (
    <SheetSection
      title="Gains"
      note={stored ? `as stored with revision ${source.number}` : "as solved, not saved yet"}
      actions={waysOut}
      ruled
    >
      <div className="mb-4 flex flex-col gap-1 text-table">
        <p className="font-mono">{law}</p>
        {observerLaw ? <p className="font-mono">{observerLaw}</p> : null}
        <p>{timeBase}</p>
      </div>
      <div className="flex flex-wrap gap-x-10 gap-y-6">
        {matrices.map((matrix) => (
          <GainMatrixFigure key={matrix.symbol} matrix={matrix} />
        ))}
      </div>
      {gains ? (
        <div className="mt-4">
          <SpringReading model={ground.model} K={gains.K} />
        </div>
      ) : null}
      <div className="mt-5">
        <Cautions />
      </div>
    </SheetSection>
  );
});

const MEANINGS: Readonly<Record<string, string>> = {
  K: "rows: what is driven · columns: because of",
  F: "rows: what is driven · columns: what is commanded",
  L: "rows: what is corrected · columns: what is measured",
};

function GainMatrixFigure({ matrix: { symbol, meaning, rows, columns, values } }: Readonly<{ matrix: GainMatrix }>) {
  return <WovenMatrix name={symbol} caption={meaning} note={MEANINGS[symbol]} {...{ rows, columns, values }} copy={false} />;
}

/** Files hold what is stored, so that a number on a machine can be traced to a revision. */
function Downloads({ solved: { source } }: Readonly<{ solved: Solved }>) {
  if (source.kind === "computed") return <span className="text-sm text-soft">files once it is saved</span>;
  return (["csv", "json"] as const).map((format) => (
    <a key={format} href={gainFileAddress(source.revisionId, format)} download className={buttonStyle("plain", "small")}>
      Download {format.toUpperCase()}
    </a>
  ));
}
