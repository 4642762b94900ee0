import type { Criterion } from "@/control/design/criteria";
import type { Recipe } from "@/control/design/recipe";
import type { PlantModel } from "@/control/plant/model";
import type { Computation, DesignRevision, DesignSummary } from "@/lib/schemas/design";
import type { LiveSolution } from "../live/live-messages";
import type { Curves } from "../responses/curves";

/** The plant revision that a recipe is for. */
export type Ground = { readonly plantRevision: { readonly id: string; readonly number: number }; readonly model: PlantModel };

/** What the page starts from, as the server keeps it. Without a design it is about to be made. */
export type BenchStart = {
  readonly plant: {
    readonly id: string;
    readonly name: string;
    readonly newest: { readonly id: string; readonly number: number };
    readonly archived: boolean;
    /** What its designs are held against, as it stands now. */
    readonly criteria: readonly Criterion[];
  };
  readonly design: DesignSummary | null;
  readonly revision: DesignRevision | null;
  /** An older revision that the address asks for. */
  readonly older: boolean;
  readonly ground: Ground;
  readonly recipe: Recipe;
};

/** What was solved last and is shown: stored with a revision, or computed for this page only. */
export type Solved = {
  readonly recipe: Recipe;
  readonly ground: Ground;
  readonly evidence: DesignRevision["evidence"];
  readonly source:
    | { readonly kind: "stored"; readonly revisionId: string; readonly number: number }
    | { readonly kind: "computed"; readonly curves: readonly Curves[]; readonly milliseconds: number | null };
};

/** Solved on the server. */
export const asComputed = (ground: Ground, recipe: Recipe, { evidence, responses }: Computation): Solved => ({
  recipe,
  ground,
  evidence,
  source: { kind: "computed", curves: responses, milliseconds: null },
});

/** Solved in the page. What the core returns is what the service sends, but for its arrays, which nobody here writes to. */
export const asLive = (ground: Ground, recipe: Recipe, { evidence, curves, milliseconds }: LiveSolution): Solved => ({
  recipe,
  ground,
  evidence: evidence as unknown as Solved["evidence"],
  source: { kind: "computed", curves, milliseconds },
});

export const asStored = ({ id, number, recipe, evidence, plantRevision, model }: DesignRevision): Solved => ({
  recipe,
  ground: { plantRevision, model },
  evidence,
  source: { kind: "stored", revisionId: id, number },
});
