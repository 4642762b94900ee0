import type { Summary } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import type { Part } from "@/control/plant/report";
import { formatNumber, formatSeconds } from "@/control/words/format-number";

export type TradePoint = {
  /** Place in the sweep. */
  readonly place: number;
  readonly factor: number;
  /** Seconds. */
  readonly settling: number;
  /** Of the input that is worst off: over its limit where there are limits, else in its unit. */
  readonly effort: number;
  readonly words: string;
};

export type EffortScale = { readonly input: number; readonly label: string; readonly ofLimit: boolean };

/** What efforts are compared by: the worst use of a limit, or, on a plant without limits, the first input's peak. */
export function effortScale({ inputs }: PlantModel): EffortScale {
  const ofLimit = inputs.some(({ lower, upper }) => lower !== null || upper !== null);
  return ofLimit
    ? { input: 0, ofLimit, label: "Largest effort, % of its limit" }
    : { input: 0, ofLimit, label: `Peak of ${inputs[0]?.name}, ${inputs[0]?.unit}` };
}

const effortOf = ({ peakEffort }: Summary, { input, ofLimit }: EffortScale): number =>
  ofLimit ? 100 * Math.max(...peakEffort.map(({ overLimit }) => overLimit ?? 0)) : (peakEffort[input]?.peak ?? 0);

/** The points that have both figures; a recipe that was refused, or does not settle, has none. */
export function tradePoints(figures: readonly Part<Summary>[], factors: readonly number[], model: PlantModel): TradePoint[] {
  const scale = effortScale(model);
  return figures.flatMap((part, place): TradePoint[] => {
    if (part.state === "refused" || part.value.worstSettling === null) return [];
    const { worstSettling: settling, worstCrossPeak } = part.value;
    const effort = effortOf(part.value, scale);
    const size = scale.ofLimit ? `${formatNumber(effort, 3)} % of a limit` : `${formatNumber(effort)} ${model.inputs[0]?.unit}`;
    const cross = worstCrossPeak ? `, cross-axis peak ${formatNumber(100 * worstCrossPeak.peak, 3)} % of its step` : "";
    const words = `${formatNumber(factors[place], 3)} times: settles in ${formatSeconds(settling)}, effort ${size}${cross}`;
    return [{ place, factor: factors[place], settling, effort, words }];
  });
}
