import { AxisSample } from "../plots/axis-bar";
import { designDash } from "../plots/axis-style";
import { SheetSection } from "../ui/sheet-section";
import type { ComparedDesign } from "./compare-designs";
import { tradeWords } from "./trade-words";

/** What each design gains over the first, and for what: one sentence each, made from the figures above. */
export function ComparedTrades({ designs: [first, ...others] }: Readonly<{ designs: readonly ComparedDesign[] }>) {
  return (
    <SheetSection title="What each trade bought" note={`held against ${first.label}; worst over everything commanded`} ruled>
      <ul className="flex max-w-[80ch] flex-col gap-2">
        {others.map(({ id, place, trade }) => (
          <li key={id} className="flex items-baseline gap-3 break-inside-avoid">
            <span className="shrink-0">
              <AxisSample axis={null} dash={designDash(place)} />
            </span>
            <span>{tradeWords(first.trade, trade)}</span>
          </li>
        ))}
      </ul>
    </SheetSection>
  );
}
