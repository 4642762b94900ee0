"use client";

import { joinNames } from "@/control/words/join-names";
import type { GainMatrix } from "../designs/gains/gain-matrices";
import { type GainFacts, gainText } from "../designs/gains/gain-text";
import { WovenMatrix } from "../matrix/woven-matrix";
import { Cautions } from "../ui/cautions";
import { CopyButton } from "../ui/copy-button";
import { Disclosure } from "../ui/disclosure";
import { Segmented } from "../ui/radio-group";
import { SheetSection } from "../ui/sheet-section";
import type { ComparedDesign } from "./compare-designs";
import { absentWords, differsFrom, gainDifference, noDifference } from "./compared-gains";
import { mergeOrder } from "./compared-rows";
import { observersDiffer } from "./observer-words";
import type { SideBySideView } from "./use-side-by-side-view";

type ComparedMatricesProps = Readonly<{ designs: readonly ComparedDesign[]; view: SideBySideView; whole: boolean }>;

const find = ({ matrices }: GainFacts, symbol: string) => matrices.find((matrix) => matrix.symbol === symbol);

/** The gains of every design in the weave, as they are or minus the first's. */
export function ComparedMatrices({ designs, view: [view, setView], whole }: ComparedMatricesProps) {
  const symbols = mergeOrder(designs.map(({ gains }) => gains.matrices.map(({ symbol }) => symbol)));
  const difference = view.gains === "difference";
  const note = difference ? "minus the first design's" : "an entry that differs from the first design's is underlined";
  const others = symbols.filter((symbol) => symbol !== "K");
  const observers = observersDiffer(designs);
  return (
    <SheetSection title="Gains" note={note} ruled>
      <div className="no-print mb-4 flex">
        <Segmented
          legend="Show"
          hideLegend
          value={view.gains}
          onChange={(gains) => setView({ gains })}
          choices={[
            { value: "entries", label: "each gain" },
            { value: "difference", label: "difference to the first" },
          ]}
        />
      </div>
      {observers ? <p className="mb-4 max-w-[80ch] text-table">{observers}</p> : null}
      {symbols.includes("K") ? <Matrices symbol="K" {...{ designs, difference }} /> : <p>No design here has a gain.</p>}
      {others.map((symbol) => (
        <div key={symbol} className="mt-4">
          <Disclosure summary={`${symbol}, ${meaning(designs, symbol)}`} open={whole || undefined}>
            <Matrices {...{ symbol, designs, difference }} />
          </Disclosure>
        </div>
      ))}
      <div className="mt-5">
        <Cautions />
      </div>
    </SheetSection>
  );
}

const meaning = (designs: readonly ComparedDesign[], symbol: string) =>
  designs.flatMap(({ gains }) => find(gains, symbol)?.meaning ?? []).at(0) ?? "";

type MatricesProps = Readonly<{ symbol: string; designs: readonly ComparedDesign[]; difference: boolean }>;

function Matrices({ symbol, designs, difference }: MatricesProps) {
  const [base] = designs;
  const first = find(base.gains, symbol);
  return (
    <div className="flex flex-wrap gap-x-10 gap-y-6">
      {designs.map((design, place) => {
        const { id, label, gains } = design;
        const matrix = find(gains, symbol);
        if (!matrix) {
          return (
            <p key={id} className="text-table text-soft">
              {absentWords(symbol, design)}
            </p>
          );
        }
        const changed = difference && place > 0;
        // Beside a difference a copy could be taken for it.
        const copied = symbol === "K" && !changed;
        return (
          <div key={id} className="min-w-0">
            {changed ? (
              <Difference {...{ matrix, first, design, base }} />
            ) : (
              <WovenMatrix
                name={symbol}
                caption={label}
                rows={matrix.rows}
                columns={matrix.columns}
                values={matrix.values}
                marked={place > 0 && first ? differsFrom(matrix, first) : undefined}
                copy={false}
              />
            )}
            {copied ? <CopyButton label="Copy with names and units" text={() => gainText(gains)} /> : null}
          </div>
        );
      })}
    </div>
  );
}

type DifferenceProps = Readonly<{
  matrix: GainMatrix;
  first: GainMatrix | undefined;
  design: ComparedDesign;
  base: ComparedDesign;
}>;

function Difference({ matrix, first, design, base }: DifferenceProps) {
  const why = noDifference(matrix, first, design, base);
  if (!first || why !== null) return <p className="max-w-[60ch] text-table text-soft">{why}</p>;
  const { matrix: change, left } = gainDifference(matrix, first);
  const note = left.length > 0 ? `without ${joinNames(left)}, which only one of the two has` : undefined;
  const { rows, columns, values, symbol } = change;
  return (
    <WovenMatrix
      name={`${symbol} changed`}
      caption={`${design.label} minus ${base.label}`}
      {...{ note, rows, columns, values }}
      copy={false}
    />
  );
}
