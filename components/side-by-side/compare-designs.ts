import type { PlantModel } from "@/control/plant/model";
import { describeLaw, describeObserverLaw, describeTimeBase } from "@/control/words/describe-law";
import type { DesignRevision } from "@/lib/schemas/design";
import { computed } from "../designs/evidence/figures-reply";
import { gainMatrices } from "../designs/gains/gain-matrices";
import type { GainFacts } from "../designs/gains/gain-text";
import { recipeLines } from "../designs/recipe/recipe-lines";
import { acceptanceFacts } from "./acceptance-facts";
import type { Fact } from "./compared-rows";
import { evidenceFacts } from "./evidence-facts";
import { type ObserverFacts, observerFacts } from "./observer-words";
import type { OverlaidDesign } from "./overlay-pictures";
import { type TradeSide, tradeSide } from "./trade-side";

export type ComparedDesign = OverlaidDesign & {
  readonly designId: string;
  readonly name: string;
  readonly number: number;
  readonly plantRevision: number;
  readonly outdated: boolean;
  readonly gains: GainFacts;
  readonly observer: ObserverFacts;
  readonly trade: TradeSide;
};

/** As asked for: one list of facts per design, in the order of the address. */
export type Comparing = { readonly designs: readonly ComparedDesign[]; readonly facts: readonly (readonly Fact[])[] };

/** Two revisions of one design share a name; then the revision is said too. */
function labels(revisions: readonly DesignRevision[]): string[] {
  const names = revisions.map(({ designName }) => designName);
  return revisions.map(({ designName, number }) =>
    names.filter((name) => name === designName).length > 1 ? `${designName} revision ${number}` : designName,
  );
}

function gainFacts({ plantName, plantRevision, designName, number, evidence, model }: DesignRevision): GainFacts {
  const observer = computed(evidence.observer);
  return {
    title: `${plantName}, revision ${plantRevision.number}; ${designName}, revision ${number}`,
    law: describeLaw(computed(evidence.reference) !== null, observer !== null),
    observerLaw: observer && describeObserverLaw(observer.kind, model.timeBase),
    timeBase: describeTimeBase(model.timeBase),
    matrices: gainMatrices(evidence, model),
  };
}

function comparedDesign(revision: DesignRevision, label: string, place: number): ComparedDesign {
  const { id, designId, designName, number, plantRevision, outdated, evidence, model } = revision;
  return {
    ...{ id, designId, label, place, name: designName, number, plantRevision: plantRevision.number, outdated },
    commanded: model.commanded.map(({ name, unit, amplitude }) => ({ name, unit, amplitude })),
    figures: computed(evidence.responses)?.figures ?? [],
    hasObserver: computed(evidence.observer) !== null,
    sampled: model.timeBase.kind === "sampled",
    gains: gainFacts(revision),
    observer: observerFacts(revision),
    trade: tradeSide(revision, label),
  };
}

/** Weights written as matrices stand beside accepted deviations only once both are matrices. */
const mixedForms = (revisions: readonly DesignRevision[]) => {
  const forms = revisions.flatMap(({ recipe }) => (recipe.method === "weights" ? recipe.weights.form : []));
  return new Set(forms).size > 1;
};

/** Everything said of each design, in the order it is read: recipe, reasons, what is met, evidence. */
export function factsOf(revisions: readonly DesignRevision[]): Fact[][] {
  const asMatrices = mixedForms(revisions);
  return revisions.map((revision) => [
    ...recipeLines(revision.recipe, revision.model as PlantModel, asMatrices),
    ...acceptanceFacts(revision.acceptance),
    ...evidenceFacts(revision),
  ]);
}

/** Everything that stands side by side, as plain data. The revisions are of one plant. */
export function compareDesigns(revisions: readonly DesignRevision[]): Comparing {
  const names = labels(revisions);
  // Numbers are for files; a page shows texts.
  const facts = factsOf(revisions).map((own) => own.map(({ data: _, ...fact }) => fact));
  return { designs: revisions.map((revision, k) => comparedDesign(revision, names[k], k)), facts };
}
