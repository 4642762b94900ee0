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
import { differsFrom, gainDifference } from "./compared-gains";
import { mergeOrder } from "./compared-rows";
import type { SideBySideView } from "./use-side-by-side-view";

type ComparedMatricesProps = Readonly<{ designs: readonly ComparedDesign[]; view: SideBySideView; whole: boolean }>;

const find = ({ matrices }: GainFacts, symbol: string) => matrices.find((matrix) => matrix.symbol === symbol);

/** The gains of every design in the weave, as they are or minus the first's. */
export function ComparedMatrices({ designs, view: [view, setView], whole }: ComparedMatricesProps) {
  const symbols = mergeOrder(designs.map(({ gains }) => gains.matrices.map(({ symbol }) => symbol)));
  const difference = view.gains === "difference";
  const note = difference ? "minus the first design's" : "an entry that differs from the first design's is underlined";
  const others = symbols.filter((symbol) => symbol !== "K");
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
  const first = find(designs[0].gains, symbol);
  return (
    <div className="flex flex-wrap gap-x-10 gap-y-6">
      {designs.map(({ id, label, gains }, place) => {
        const matrix = find(gains, symbol);
        if (!matrix) {
          return (
            <p key={id} className="text-table text-soft">
              {label} has no {symbol}.
            </p>
          );
        }
        const changed = difference && place > 0;
        // Beside a difference a copy could be taken for it.
        const copied = symbol === "K" && !changed;
        return (
          <div key={id} className="min-w-0">
            {changed ? (
              <Difference {...{ matrix, first, label }} base={designs[0].label} />
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

type DifferenceProps = Readonly<{ matrix: GainMatrix; first: GainMatrix | undefined; label: string; base: string }>;

function Difference({ matrix, first, label, base }: DifferenceProps) {
  if (!first) {
    return (
      <p className="text-table text-soft">
        {base} has no {matrix.symbol} to hold that of {label} against.
      </p>
    );
  }
  const { matrix: change, left } = gainDifference(matrix, first);
  const note = left.length > 0 ? `without ${joinNames(left)}, which only one of the two has` : undefined;
  const { rows, columns, values, symbol } = change;
  return (
    <WovenMatrix
      name={`${symbol} changed`}
      caption={`${label} minus ${base}`}
      {...{ note, rows, columns, values }}
      copy={false}
    />
  );
}
