import type { DesignRevision } from "@/lib/schemas/design";
import type { Summary } from "@/lib/schemas/evidence";
import { computed, type ResponsesReply } from "../designs/evidence/figures-reply";
import { OBSERVER_WORDS } from "../designs/recipe/recipe-words";
import type { Loop } from "./overlay-pictures";

export type TradeEffort = {
  readonly name: string;
  readonly unit: string;
  readonly peak: number;
  readonly overLimit: number | null;
};
/** Worst over everything commanded; null where a figure does not exist. */
export type TradeFigures = {
  readonly settling: number | null;
  /** What is commanded when it settles last; null where several do. */
  readonly slowest: string | null;
  readonly rise: number | null;
  readonly overshoot: number | null;
  /** Over the moved quantity's own step. */
  readonly cross: number | null;
  readonly effort: readonly TradeEffort[];
};

/** One design as far as a trade is said of it. */
export type TradeSide = {
  readonly label: string;
  readonly plantRevision: number;
  readonly observer: string | null;
  readonly figures: Readonly<Record<Loop, TradeFigures | null>>;
  /** Why it has no figures at all. */
  readonly silent: "refused" | "no-reference" | null;
};

function slowestOf({ figures }: ResponsesReply, loop: Loop, { commanded }: DesignRevision["model"]): string | null {
  const steps = figures
    .filter((step) => step.loop === loop)
    .map(({ source, commanded: moved }) => ({ source, settling: moved[source]?.settling ?? null }));
  const longest = Math.max(...steps.map(({ settling }) => settling ?? Number.NEGATIVE_INFINITY));
  const last = steps.filter(({ settling }) => settling === longest);
  return last.length === 1 ? (commanded[last[0].source]?.name ?? null) : null;
}

/** What a trade is said of, from the stored evidence alone. */
export function tradeSide(revision: DesignRevision, label: string): TradeSide {
  const { evidence, model, plantRevision, recipe } = revision;
  const responses = computed(evidence.responses);
  const stepped = responses !== null && responses.figures.length > 0;
  const read = (loop: Loop, summary: Summary | null): TradeFigures | null =>
    stepped && summary
      ? {
          settling: summary.worstSettling,
          slowest: slowestOf(responses, loop, model),
          rise: summary.worstRise,
          overshoot: summary.worstOvershoot,
          cross: summary.worstCrossPeak?.peak ?? null,
          effort: summary.peakEffort.map((one, index) => ({ ...model.inputs[index], ...one })).map(toEffort),
        }
      : null;
  return {
    label,
    plantRevision: plantRevision.number,
    observer: computed(evidence.observer) && OBSERVER_WORDS[recipe.observer.kind],
    figures: {
      "full-state": read("full-state", responses?.summary.fullState ?? null),
      observer: read("observer", responses?.summary.observer ?? null),
    },
    silent: responses === null ? "refused" : stepped ? null : "no-reference",
  };
}

const toEffort = ({ name, unit, peak, overLimit }: TradeEffort): TradeEffort => ({ name, unit, peak, overLimit });
