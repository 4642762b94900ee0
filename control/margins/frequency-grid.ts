import { NumericalError } from "../errors";
import type { Complex } from "../plant/model";
import type { System } from "../plant/scale-plant";
import { transmissionZeros } from "../structure/transmission-zeros";
import { rising } from "./partition";
import { prepareFrequency } from "./prepare-frequency";
import { frequencyOf } from "./response-at";

const MOST_DECADES = 40;
const WIDEST_RATIO = 1e40;
/** Poles and zeros beyond this are not drawn. */
const EXTREME = 1e290;
/** Points a decade are 2 to this power: with more decades fewer, so that there are about 200 to 500 in all. */
const DENSITIES = [
  { decades: 4, halvings: 6 },
  { decades: 8, halvings: 5 },
  { decades: 16, halvings: 4 },
  { decades: MOST_DECADES + 2, halvings: 3 },
];
/** Lighter damping than this gets points of its own. */
const LIGHT = 0.3;
const AROUND = [-8, -4, -2, -1, -0.5, -0.25, 0, 0.25, 0.5, 1, 2, 4, 8];

/**
 * Frequencies at which the response of a system is worth drawing: equal ratios over whole decades, from one below the
 * slowest to one above the fastest pole or zero, and points close together around each lightly damped one. A sampled system
 * ends at half its sampling rate.
 *
 * Shapes    as for `frequencyResponse` → rising, all positive
 * Units     rad/s
 * Throws    as `prepareFrequency`
 * Accuracy  plain arithmetic throughout: the same places in every engine
 * Source    the poles and zeros of the system
 */
export function frequencyGrid(system: System, period: number | null = null): Float64Array {
  const { poles } = prepareFrequency(system, period);
  const features = [...poles, ...transmissionZeros(system)].flatMap((place) => featureOf(place, period));
  const last = period === null ? Number.POSITIVE_INFINITY : Math.PI / period;
  const sizes = features.map(({ frequency }) => frequency).filter((w) => w >= 1 / EXTREME && w <= Math.min(last, EXTREME));
  const centre = period === null ? 1 : last / 10;
  const low = decadeBelow(Math.min(...(sizes.length > 0 ? sizes : [centre]))) / 10;
  const top = decadeBelow(Math.max(...(sizes.length > 0 ? sizes : [centre]))) * 100;
  const high = period === null ? top : last;
  const grid = equalRatios(Math.max(low, high / WIDEST_RATIO), high);
  for (const { frequency, width } of features) {
    if (!(width < LIGHT * frequency)) continue;
    grid.push(...AROUND.map((share) => frequency + share * width));
  }
  return Float64Array.from(rising(grid.filter((w) => w >= low && w <= high)));
}

/** Frequency of a pole or zero, and how far from the boundary it is. */
function featureOf({ re, im }: Complex, period: number | null): { frequency: number; width: number }[] {
  if (im < 0) return [];
  const size = Math.sqrt(re * re + im * im);
  if (period === null) return [{ frequency: im > Math.abs(re) ? im : size, width: Math.abs(re) }];
  const angle = frequencyOf(size + re > 0 ? im / (size + re) : Number.POSITIVE_INFINITY, period) ?? 0;
  const width = Math.abs(1 - size) / period;
  return [{ frequency: Math.max(angle, width), width }];
}

/** Largest power of ten that is at most x, by multiplication alone. */
function decadeBelow(x: number): number {
  if (!(x > 0) || !Number.isFinite(x)) throw new NumericalError("bad-option", { option: "frequency", given: x });
  let decade = 1;
  while (decade > x) decade /= 10;
  while (decade * 10 <= x) decade *= 10;
  return decade;
}

function equalRatios(low: number, high: number): number[] {
  let decades = 0;
  for (let w = low; w < high; w *= 10) decades++;
  const { halvings } = DENSITIES.find((density) => decades <= density.decades) ?? DENSITIES[DENSITIES.length - 1];
  let ratio = 10;
  for (let k = 0; k < halvings; k++) ratio = Math.sqrt(ratio);
  const grid: number[] = [];
  for (let start = low; start < high; start *= 10) {
    let w = start;
    for (let k = 0; k < 1 << halvings; k++, w *= ratio) grid.push(w);
  }
  grid.push(high);
  return grid;
}
