import type { PlantModel } from "../plant/model";
import type { ResponseEvidence, StepFigures } from "./evidence";

/**
 * A limit on the step responses of a plant, by the name of what it speaks of; null: the worst over all.
 * `settling` in seconds, `overshoot` in percent of the final value, both of a commanded quantity to its own step; `cross-peak` in
 * percent of the disturbed quantity's own test amplitude, while `signal` is commanded; `effort` in percent of the input's nearest limit.
 */
export type Criterion = {
  readonly kind: "settling" | "overshoot" | "cross-peak" | "effort";
  readonly signal: string | null;
  readonly limit: number;
};

export type Verdict = {
  readonly criterion: Criterion;
  /** In the criterion's unit; null where there is nothing to judge. */
  readonly value: number | null;
  readonly met: boolean;
  /** Why there is no value: the plant has no signal of that name, the design no such response, or it never settles. */
  readonly reason: "no-signal" | "no-response" | "never" | null;
};

type Steps = Pick<ResponseEvidence, "figures">;

/**
 * Each criterion against the figures of a design, with the observer in the loop where there is one.
 *
 * Shapes    one verdict for each criterion, in their order; `steps` null where the responses were refused
 * Units     as `Criterion`
 * Throws    nothing
 * Accuracy  that of the figures; a value equal to its limit is met
 * Source    figures: IEC 60050-351; a criterion that cannot be judged is not met: common practice, no source
 */
export function judgeCriteria(criteria: readonly Criterion[], steps: Steps | null, model: PlantModel): Verdict[] {
  const loop = steps?.figures.some((step) => step.loop === "observer") ? "observer" : "full-state";
  const shown = steps?.figures.filter((step) => step.loop === loop) ?? [];
  return criteria.map((criterion) => {
    const places = placesOf(criterion, model);
    if (places.length === 0) return { criterion, value: null, met: false, reason: "no-signal" };
    const values = places.flatMap((place) => valuesAt(criterion.kind, place, shown, model));
    if (values.length === 0) return { criterion, value: null, met: false, reason: "no-response" };
    if (values.includes(null)) return { criterion, value: null, met: false, reason: "never" };
    const value = values.reduce((worst: number, each) => Math.max(worst, each ?? 0), 0);
    return { criterion, value, met: value <= criterion.limit, reason: null };
  });
}

/** Places of the commanded quantities, or of the inputs that have a limit, that a criterion speaks of. */
function placesOf({ kind, signal }: Criterion, { commanded, inputs }: PlantModel): number[] {
  const named = (list: readonly { readonly name: string }[]) =>
    list.flatMap(({ name }, place) => (signal === null || name === signal ? [place] : []));
  if (kind !== "effort") return named(commanded);
  return named(inputs).filter((place) => inputs[place].lower !== null || inputs[place].upper !== null);
}

/** Null stands for what never comes to rest. */
function valuesAt(
  kind: Criterion["kind"],
  place: number,
  steps: readonly StepFigures[],
  { commanded }: PlantModel,
): (number | null)[] {
  if (kind === "effort")
    return steps.flatMap(({ effort }) => {
      const overLimit = effort[place]?.overLimit;
      return overLimit === null || overLimit === undefined ? [] : [100 * overLimit];
    });
  return steps
    .filter(({ source }) => source === place)
    .flatMap((step) => {
      if (kind === "settling") return [step.commanded[place].settling];
      if (kind === "overshoot") return [step.commanded[place].overshoot];
      return step.commanded.flatMap(({ peak }, other) =>
        other === place ? [] : [(100 * peak) / (Math.abs(commanded[other].amplitude) || 1)],
      );
    });
}
