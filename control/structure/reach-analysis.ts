import { eigenvalues } from "../linalg/eigenvalues";
import { fromFlat, pythagoras } from "../linalg/flat";
import { flatNorm } from "../linalg/norms";
import type { Complex } from "../plant/model";
import type { RankReport } from "../plant/report";
import { balanceSystem } from "./balance-system";
import { type ModeDistance, modeDistance } from "./mode-distance";
import { type Staircase, staircase } from "./staircase";
import { hiddenPart, longAxis } from "./weakest-direction";

/** Per eigenvalue: relative distance, and whether inputs reach it. */
export type ReachAnalysis = {
  readonly report: RankReport;
  readonly distances: readonly number[];
  readonly reached: readonly boolean[];
};

/** One choice of units for states, inputs and time; reach shown in one of them holds in all. */
type Units = {
  readonly a: Float64Array;
  readonly b: Float64Array;
  readonly stateScale: Float64Array;
  readonly timeScale: number;
};

/**
 * Reach of the inputs: rank by the staircase form, and mode by mode by the smallest singular value of [A - λ I, B].
 * Where the pair as given leaves a doubt, both are repeated in balanced units, and the better verdict counts.
 *
 * Shapes    a n×n, b n×m, row-major; values: the eigenvalues of a, pairs adjacent with im > 0 first
 * Throws    no-convergence
 * Accuracy  a verdict "not reached" holds for a pair within 4 (n + m) ε of the given one, in both choices of units
 * Source    Paige, IEEE Trans. Automatic Control 26 (1981) 130-138
 */
export function analyseReach(a: Float64Array, b: Float64Array, n: number, m: number, values: readonly Complex[]): ReachAnalysis {
  const limit = 4 * (n + m) * Number.EPSILON;
  const certain = ({ relative, normRatio }: ModeDistance) => relative * normRatio > limit;
  const given: Units = { a, b, stateScale: new Float64Array(n).fill(1), timeScale: 1 };
  const probes = probeModes(given, n, m, values);
  const reached = probes.map(certain);
  let used = given;
  let stairs = staircase(a, b, n, m);
  if (stairs.rank < n || reached.includes(false)) {
    const balanced = balancedUnits(given, n, m);
    const again = staircase(balanced.a, balanced.b, n, m);
    probeModes(balanced, n, m, values).forEach((probe, k) => {
      if (certain(probe)) reached[k] = true;
    });
    if (again.rank > stairs.rank) {
      used = balanced;
      stairs = again;
    }
  }
  const rank = Math.min(stairs.rank, n - countHidden(values, reached, flatNorm(a)));
  markHidden(reached, values, stairs, used.timeScale);
  const weakest = weakestOf(probes, reached);
  const { re, im, relative } = probes[weakest];
  return {
    report: {
      rank,
      full: n,
      singularValues: stairs.singularValues,
      tolerance: stairs.tolerance,
      weakestDirection: Array.from(hiddenPart(longAxis(re, im), stairs, used.stateScale)),
      weakestValue: relative,
    },
    distances: probes.map((probe) => probe.relative),
    reached,
  };
}

function probeModes({ a, b, timeScale }: Units, n: number, m: number, values: readonly Complex[]): ModeDistance[] {
  const probes: ModeDistance[] = [];
  values.forEach(({ re, im }, k) => {
    probes.push(im < 0 ? probes[k - 1] : modeDistance(a, b, n, m, { re: re * timeScale, im: im * timeScale }));
  });
  return probes;
}

function balancedUnits({ a, b }: Units, n: number, m: number): Units {
  const none = new Float64Array(0);
  return balanceSystem({ n, m, p: 0, a, b, c: none, d: none });
}

/** Hidden modes, counting values closer together than they can be told apart as one: a lower bound on what the rank lacks. */
function countHidden(values: readonly Complex[], reached: readonly boolean[], norm: number): number {
  const near = Math.sqrt(Number.EPSILON) * norm;
  const distinct: Complex[] = [];
  values.forEach((value, k) => {
    if (reached[k] || distinct.some((other) => pythagoras(other.re - value.re, other.im - value.im) <= near)) return;
    distinct.push(value);
  });
  return distinct.length;
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
