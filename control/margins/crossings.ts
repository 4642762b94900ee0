import { axisPlaces, type CrossingKind } from "./axis-places";
import { boundaryForm } from "./boundary-form";
import { partition } from "./partition";
import type { FrequencySystem } from "./prepare-frequency";
import { type SensitivityPoint, sensitivityAt } from "./sensitivity-point";

/** The last two points between which the condition changes sign, as near as doubles allow; equal where it only touches. */
export type Crossing = readonly [SensitivityPoint, SensitivityPoint];

const MOST_STEPS = 200;

/**
 * Every crossing of one loop strictly between rest and infinite frequency. With L = 1/S - 1 both conditions are linear in S,
 * and their places are zeros of S(s) ± S(-s), found as eigenvalues. Each zero, on the axis or not, only cuts the axis into
 * pieces: it is the sign of the exact response at the cuts and between them that decides, and bisection that finishes.
 *
 * Shapes    the sensitivity of one loop, stable → crossings in order of frequency
 * Throws    no-convergence; too-large
 * Accuracy  frequency to a rounding unless the crossing is nearly a touch; a pair of crossings nearer to each other than
 *           their computed zeros are accurate may be taken for a touch
 * Source    Byers, SIAM J. Sci. Stat. Comput. 9 (1988) 875-881, for crossings as eigenvalues
 */
export function crossings(system: FrequencySystem, kind: CrossingKind): Crossing[] {
  if (system.n === 0) return [];
  const form = boundaryForm(system);
  const found: Crossing[] = [];
  let last: Signed | null = null;
  let touch: Signed | null = null;
  for (const v of partition(axisPlaces(form, kind, system.size))) {
    const here = signedAt(system, kind, v);
    if (here.sign === 0) {
      if (touch === null || Math.abs(here.value) < Math.abs(touch.value)) touch = here;
      continue;
    }
    if (last !== null && last.sign !== here.sign) found.push(narrow(system, kind, last, here));
    else if (last !== null && touch !== null) found.push([touch.point, touch.point]);
    last = here;
    touch = null;
  }
  return found;
}

type Signed = { readonly point: SensitivityPoint; readonly value: number; readonly sign: -1 | 0 | 1 };

function signedAt(system: FrequencySystem, kind: CrossingKind, v: number): Signed {
  const point = sensitivityAt(system, v);
  const value = kind === "gain" ? (point.S.re - point.T.re) / 2 : point.S.im;
  const sign = Math.abs(value) <= point.errorOfS ? 0 : value > 0 ? 1 : -1;
  return { point, value, sign };
}

/** Secant steps that must halve the interval every third time, until its ends are neighbours or the condition holds exactly. */
function narrow(system: FrequencySystem, kind: CrossingKind, left: Signed, right: Signed): Crossing {
  let low = left;
  let high = right;
  let lowWeight = left.value;
  let highWeight = right.value;
  for (let step = 0; step < MOST_STEPS; step++) {
    const width = high.point.v - low.point.v;
    const middle = low.point.v + width / 2;
    if (!(middle > low.point.v && middle < high.point.v)) break;
    const secant = low.point.v + width * (lowWeight / (lowWeight - highWeight));
    const nudged = Math.min(Math.max(secant, low.point.v + 2 ** -52 * middle), high.point.v - 2 ** -52 * middle);
    const place = step % 3 === 2 || !(nudged > low.point.v && nudged < high.point.v) ? middle : nudged;
    const here = signedAt(system, kind, place);
    if (here.value === 0) return [here.point, here.point];
    if (here.value > 0 === low.value > 0) {
      low = here;
      lowWeight = here.value;
      highWeight /= 2;
    } else {
      high = here;
      highWeight = here.value;
      lowWeight /= 2;
    }
    if (low.sign === 0 && high.sign === 0 && step > 60) break;
  }
  return [low.point, high.point];
}
