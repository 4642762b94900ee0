import type { PlantModel } from "../plant/model";
import type { WeightsRecipe } from "./recipe";

const smaller = (a: number, b: number) => Math.min(a, b);

/** Room that an input has to both sides of its operating point, or null without limits. */
function effortRoom(model: PlantModel, index: number): number | null {
  const { lower, upper } = model.inputs[index];
  const held = model.operatingPoint.inputs[index];
  const rooms = [lower === null ? null : held - lower, upper === null ? null : upper - held].filter(
    (room) => room !== null && room > 0,
  );
  return rooms.length === 0 ? null : (rooms as number[]).reduce(smaller);
}

/**
 * A recipe to start from: every state and input weighted by its own largest acceptable deviation or limit (Bryson & Ho), no
 * observer, feed-through, a test that starts at the largest acceptable deviations and disturbs each input by a tenth of its room.
 *
 * Shapes    those of the plant
 * Units     the signals' units
 * Throws    nothing
 * Accuracy  deviations and limits as given
 * Source    Bryson & Ho, Applied Optimal Control, Blaisdell 1969, section 5.2
 */
export function defaultRecipe(model: PlantModel): WeightsRecipe {
  const accepted = model.inputs.map(({ scale }, index) => scale ?? effortRoom(model, index) ?? 1);
  return {
    version: 1,
    method: "weights",
    weights: { form: "deviations", states: model.states.map(({ scale }) => scale ?? 1), inputs: accepted },
    crossWeight: null,
    degreeOfStability: null,
    observer: { kind: "none" },
    reference: { kind: model.commanded.length > 0 ? "feed-through" : "none" },
    test: {
      horizon: null,
      initialState: model.states.map(({ scale }) => scale ?? 1),
      inputDisturbance: accepted.map((effort) => effort / 10),
    },
    reasons: {},
  };
}
