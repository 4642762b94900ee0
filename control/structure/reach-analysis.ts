import { NumericalError } from "../errors";
import { modulus } from "../linalg/complex";
import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat, pythagoras } from "../linalg/flat";
import { singularValues } from "../linalg/singular-values";
import type { Complex } from "../plant/model";
import type { RankReport } from "../plant/report";
import { type BalancedPair, balancePair } from "./balance-pair";
import { type ModeDistance, modeDistance } from "./mode-distance";
import { type Staircase, staircase } from "./staircase";
import { hiddenPart, longAxis } from "./weakest-direction";

/** Per eigenvalue: relative distance, and whether inputs reach it. */
export type ReachAnalysis = {
  readonly report: RankReport;
  readonly distances: readonly number[];
  readonly reached: readonly boolean[];
};

/** Length at which a direction counts as independent of others: rounding in a direction is far below, a new mode far above. */
const APART = 1e-3;

/**
 * Reach of the inputs: rank by the staircase form in units that do not depend on the given ones, and mode by mode the
 * smallest singular value of [A - λ I, B] in the given units; a mode reached in one choice of units is reached.
 *
 * Shapes    a n×n, b n×m, row-major; values: the eigenvalues of a, pairs adjacent with im > 0 first
 * Throws    shape-mismatch without any state; no-convergence
 * Accuracy  a verdict "not reached" holds for a pair within 4 (n + m) ε of the given one, in both choices of units
 * Source    Paige, IEEE Trans. Automatic Control 26 (1981) 130-138
 */
export function analyseReach(a: Float64Array, b: Float64Array, n: number, m: number, values: readonly Complex[]): ReachAnalysis {
  if (n === 0) throw new NumericalError("shape-mismatch", { A: [n, n], B: [n, m] });
  const limit = 4 * (n + m) * Number.EPSILON;
  const certain = ({ relative, normRatio }: ModeDistance) => relative * normRatio > limit;
  const fastest = values.reduce((size, value) => Math.max(size, modulus(value)), 0);
  const balanced = balancePair(a, b, n, m, fastest);
  const stairs = staircase(balanced.a, balanced.b, n, m);
  const probes = probeModes({ a, b, timeScale: 1 }, n, m, values);
  const reached = probes.map(certain);
  if (reached.includes(false)) {
    probeModes(balanced, n, m, values).forEach((probe, k) => {
      if (certain(probe)) reached[k] = true;
    });
  }
  const rank = Math.min(stairs.rank, n - countHidden(probes, reached));
  markHidden(reached, values, stairs, balanced.timeScale);
  const weakest = weakestOf(probes, reached);
  const { re, im, relative } = probes[weakest];
  return {
    report: {
      rank,
      full: n,
      singularValues: stairs.singularValues,
      tolerance: stairs.tolerance,
      weakestDirection: Array.from(hiddenPart(longAxis(re, im), stairs, balanced.stateScale)),
      weakestValue: relative,
    },
    distances: probes.map((probe) => probe.relative),
    reached,
  };
}

function probeModes(
  { a, b, timeScale }: Pick<BalancedPair, "a" | "b" | "timeScale">,
  n: number,
  m: number,
  values: readonly Complex[],
): ModeDistance[] {
  const probes: ModeDistance[] = [];
  values.forEach(({ re, im }, k) => {
    probes.push(im < 0 ? probes[k - 1] : modeDistance(a, b, n, m, { re: re * timeScale, im: im * timeScale }));
  });
  return probes;
}

/** Independent directions that belong to hidden modes, near parallels counted once: a lower bound on what the rank lacks. */
function countHidden(probes: readonly ModeDistance[], reached: readonly boolean[]): number {
  const directions = probes.flatMap(({ re, im }, k) => (reached[k] || (k > 0 && probes[k - 1] === probes[k]) ? [] : [re, im]));
  if (directions.length === 0) return 0;
  const lengths = singularValues(
    fromFlat(
      directions.flatMap((x) => Array.from(x)),
      directions.length,
      directions[0].length,
    ),
  );
  return lengths.filter((length) => length > APART).length;
}

/** The modes of the part that the staircase leaves out are not reached, even where rounding moved them off their place. */
function markHidden(reached: boolean[], values: readonly Complex[], { rank, a, n }: Staircase, timeScale: number): void {
  const size = n - rank;
  const rest = new Float64Array(size * size);
  for (let i = 0; i < size; i++) for (let j = 0; j < size; j++) rest[i * size + j] = a[(rank + i) * n + rank + j];
  const taken = new Set<number>();
  for (const hidden of eigenvalues(fromFlat(rest, size, size))) {
    let nearest = 0;
    let least = Number.POSITIVE_INFINITY;
    values.forEach((value, k) => {
      const distance = pythagoras(value.re * timeScale - hidden.re, value.im * timeScale - hidden.im);
      if (taken.has(k) || distance >= least) return;
      nearest = k;
      least = distance;
    });
    taken.add(nearest);
    reached[nearest] = false;
  }
  values.forEach(({ im }, k) => {
    if (im < 0 && reached[k] !== reached[k - 1]) reached[k] = reached[k - 1] = false;
  });
}

/** A hidden mode if there is one, else the mode with the smallest distance. */
function weakestOf(probes: readonly ModeDistance[], reached: readonly boolean[]): number {
  let best = 0;
  probes.forEach((probe, k) => {
    const other = probes[best];
    if (reached[k] === reached[best] ? probe.relative < other.relative : reached[best]) best = k;
  });
  return best;
}
