import { workArray } from "../linalg/work-array";
import type { Admissible, InputRange } from "./admissible-vectors";
import { chainStep } from "./chain-space";
import { createFrame, dotRow, type Frame, frameCost, refreshDuals } from "./eigenvector-frame";
import { minimiseSmooth } from "./minimise-smooth";
import type { ScaledPlant } from "./scale-plant";
import { createDescentRoom } from "./search-scratch";

const SEEDS = 2;
const STEPS = 60;
/** A start with a condition beyond this belongs to chains that the plant does not have. */
const HOPELESS = 1e13;

/** One vector of a chain: where its own part starts among the variables, and how it leans on the vector before it. */
type Link = {
  readonly space: Admissible;
  readonly from: number;
  readonly after: number | null;
  readonly step: { readonly re: Float64Array; readonly im: Float64Array } | null;
};

/**
 * Eigenvectors and principal vectors of a loop with repeated poles, chosen so that |X| |X⁻¹| is small: every vector is an
 * admissible eigenvector plus what the one before it in its chain calls for.
 *
 * Shapes    one admissible space per block, chains of places of blocks → n×n; null when these chains do not span the states
 * Units     scaled states and time: neighbours in a chain are coupled by one
 * Throws    singular, as `chainStep`
 * Accuracy  a local optimum of the Frobenius condition, nearly
 * Source    Klein & Moore, IEEE Trans. Autom. Control 22 (1977) 140-141, from memory; the search is our own
 */
export function chainVectors(
  plant: ScaledPlant,
  range: InputRange,
  spaces: readonly Admissible[],
  chains: readonly (readonly number[])[],
): Frame | null {
  const { n } = plant;
  const links = linksOf(plant, range, spaces, chains);
  const variables = links.reduce((sum, { space }) => sum + space.pole.width * space.size, 0);
  const side = { frame: createFrame(n), pull: workArray(n * n), square: workArray(n * n) };
  let best: Frame | null = null;
  let least = Number.POSITIVE_INFINITY;
  for (let seed = 0; seed < SEEDS; seed++) {
    const room = createDescentRoom(variables);
    for (let i = 0; i < variables; i++) room.x[i] = spread(i + 1, seed);
    const start = chainCost(side, links, room.x, room.gradient);
    if (!(start < HOPELESS * HOPELESS)) continue;
    const curvature = dotRow(room.x, 0, room.x, 0, variables) / (2 * start);
    for (let i = 0; i < variables; i++) room.inverse[i * variables + i] = curvature;
    minimiseSmooth((x, gradient) => chainCost(side, links, x, gradient), room, variables, STEPS);
    const reached = chainCost(side, links, room.x, room.gradient);
    if (!(reached < least)) continue;
    least = reached;
    best = side.frame;
    side.frame = createFrame(n);
  }
  return best;
}

/** Fractional parts in general position, from -1/2 to 1/2. */
function spread(place: number, seed: number): number {
  const turned = place * (seed === 0 ? 0.6180339887498949 : 0.41421356237309515) + place * place * 0.0137;
  return turned - Math.floor(turned) - 0.5;
}

/** In the order of the chains, each vector after the one it leans on. */
function linksOf(
  plant: ScaledPlant,
  range: InputRange,
  spaces: readonly Admissible[],
  chains: readonly (readonly number[])[],
): Link[] {
  let from = 0;
  return chains.flatMap((chain) => {
    const step = chain.length > 1 ? chainStep(plant, range, spaces[chain[0]]) : null;
    return chain.map((place, k) => {
      const space = spaces[place];
      const link = { space, from, after: k === 0 ? null : spaces[chain[k - 1]].pole.column, step };
      from += space.pole.width * space.size;
      return link;
    });
  });
}

type Side = { frame: Frame; readonly pull: Float64Array; readonly square: Float64Array };

/** |X|² |X⁻¹|² of the chains with given variables, and its gradient; Infinity where they do not span the states. */
function chainCost(side: Side, links: readonly Link[], z: Float64Array, gradient: Float64Array): number {
  const { frame, pull, square } = side;
  const { n, columns, duals } = frame;
  for (const link of links) setVector(frame, link, z);
  const size = dotRow(columns, 0, columns, 0, n * n);
  if (!refreshDuals(frame)) return Number.POSITIVE_INFINITY;
  const inverse = frameCost(frame);
  // Row j of `pull` is the derivative by column j: 2 |Y|² xⱼ - 2 |X|² Y'Y yⱼ, Y = X⁻¹ with rows yⱼ.
  for (let i = 0; i < n; i++) for (let j = 0; j < n; j++) square[i * n + j] = dotRow(duals, i * n, duals, j * n, n);
  for (let j = 0; j < n; j++) {
    for (let i = 0; i < n; i++) {
      let sum = 0;
      for (let k = 0; k < n; k++) sum += square[j * n + k] * duals[k * n + i];
      pull[j * n + i] = 2 * inverse * columns[j * n + i] - 2 * size * sum;
    }
  }
  for (const link of links.toReversed()) passBack(pull, n, link, gradient);
  return size * inverse;
}

/** v = S z + step v₀ in the columns of the frame; a pair takes √2 Re v and √2 Im v. */
function setVector({ n, columns }: Frame, { space, from, after, step }: Link, z: Float64Array): void {
  const { size, re, im, pole } = space;
  const at = pole.column * n;
  const pair = pole.width === 2;
  const factor = pair ? Math.SQRT2 : 1;
  for (let i = 0; i < n; i++) {
    let x = 0;
    let y = 0;
    for (let k = 0; k < size; k++) {
      const u = z[from + k] * factor;
      const v = pair ? z[from + size + k] * factor : 0;
      x += re[i * size + k] * u - im[i * size + k] * v;
      y += re[i * size + k] * v + im[i * size + k] * u;
    }
    for (let j = 0; j < n && after !== null && step; j++) {
      const u = columns[after * n + j];
      const v = pair ? columns[(after + 1) * n + j] : 0;
      x += step.re[i * n + j] * u - step.im[i * n + j] * v;
      y += step.re[i * n + j] * v + step.im[i * n + j] * u;
    }
    columns[at + i] = x;
    if (pair) columns[at + n + i] = y;
  }
}

/** The adjoint of `setVector`: from derivatives by the columns to those by the variables and by the vector before. */
function passBack(pull: Float64Array, n: number, { space, from, after, step }: Link, gradient: Float64Array): void {
  const { size, re, im, pole } = space;
  const at = pole.column * n;
  const pair = pole.width === 2;
  const factor = pair ? Math.SQRT2 : 1;
  for (let k = 0; k < pole.width * size; k++) gradient[from + k] = 0;
  for (let i = 0; i < n; i++) {
    const x = pull[at + i];
    const y = pair ? pull[at + n + i] : 0;
    for (let k = 0; k < size; k++) {
      gradient[from + k] += factor * (re[i * size + k] * x + im[i * size + k] * y);
      if (pair) gradient[from + size + k] += factor * (re[i * size + k] * y - im[i * size + k] * x);
    }
    for (let j = 0; j < n && after !== null && step; j++) {
      pull[after * n + j] += step.re[i * n + j] * x + step.im[i * n + j] * y;
      if (pair) pull[(after + 1) * n + j] += step.re[i * n + j] * y - step.im[i * n + j] * x;
    }
  }
}
