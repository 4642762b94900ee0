import type { ObserverRecipe, PolesRecipe, WeightsRecipe } from "@/control/design/recipe";

const diagonal = (values: readonly number[]) => values.map((value, i) => values.map((_, j) => (i === j ? value : 0)));

const rest = {
  version: 1,
  observer: { kind: "none" },
  reference: { kind: "feed-through" },
  test: { horizon: null, initialState: [0.001, 0, 0, 0], inputDisturbance: [4, 0] },
  reasons: {},
} as const;

/** For the two carriages: each state and input by its largest acceptable deviation. */
export function byWeights(changes: Partial<WeightsRecipe> = {}): WeightsRecipe {
  const weights = { form: "deviations", states: [0.001, 0.001, 0.05, 0.05], inputs: [40, 40] } as const;
  const reasons = { weights: "Half of the belt's backlash" };
  return { ...rest, method: "weights", weights, crossWeight: null, degreeOfStability: null, reasons, ...changes };
}

/** For the two carriages: two well damped pairs. */
export function byPoles(changes: Partial<PolesRecipe> = {}): PolesRecipe {
  const pair = (frequency: number) => ({ kind: "damping", frequency, damping: 0.7 }) as const;
  return { ...rest, method: "poles", poles: [pair(20), pair(30)], ...changes };
}

/** One of each kind, for the two carriages and their two encoders. */
export const observers: Readonly<Record<ObserverRecipe["kind"], ObserverRecipe>> = {
  none: { kind: "none" },
  poles: { kind: "poles", poles: [-60, -70, -80, -90].map((value) => ({ kind: "real", value })) },
  noise: { kind: "noise", process: diagonal([1e-8, 1e-8, 1e-2, 1e-2]), measurement: diagonal([1e-12, 1e-12]) },
  reduced: { kind: "reduced", poles: [-60, -70].map((value) => ({ kind: "real", value })) },
};
