import type { PoleEntry } from "../design/recipe";
import { NumericalError } from "../errors";
import type { Complex, TimeBase } from "../plant/model";
import { complexExponential } from "./complex-exponential";

/**
 * The poles that a list of entries stands for, in the plant's own plane and in the order of the entries.
 *
 * Shapes    k entries → between k and 2k poles; of a pair im > 0 first, and the two are exactly conjugate
 * Units     continuous 1/s, sampled none; damping entries in rad/s, time constants in s, both mapped by z = exp(s h)
 * Throws    bad-option { option: "poles", index, given } for an entry that is not finite, a frequency or time constant
 *           that is not positive, or an oscillation beyond half the sampling rate, which samples cannot tell apart
 * Accuracy  4 ε of the pole's modulus; two poles of an overdamped entry are found without cancellation
 * Source    s² + 2 ζ ω s + ω²
 */
export function resolvePoles(entries: readonly PoleEntry[], timeBase: TimeBase): Complex[] {
  return entries.flatMap((entry, index) => {
    const refuse = (): never => {
      throw new NumericalError("bad-option", { option: "poles", index, given: entry });
    };
    const poles = entryPoles(entry, timeBase, refuse);
    return poles.every(({ re, im }) => Number.isFinite(re) && Number.isFinite(im)) ? poles : refuse();
  });
}

/** How many poles an entry stands for, so that a place in the list of poles can be traced to its entry. */
export function polesPerEntry(entry: PoleEntry): 1 | 2 {
  return entry.kind === "real" || entry.kind === "time-constant" ? 1 : 2;
}

function entryPoles(entry: PoleEntry, timeBase: TimeBase, refuse: () => never): Complex[] {
  if (entry.kind === "real") return [{ re: entry.value + 0, im: 0 }];
  if (entry.kind === "pair") return pair(entry.re, entry.im);
  const inPlane = (s: Complex) => (timeBase.kind === "continuous" ? s : sampledPole(s, timeBase.period, refuse));
  if (entry.kind === "time-constant") {
    if (!(entry.seconds > 0)) refuse();
    return [inPlane({ re: -1 / entry.seconds, im: 0 })];
  }
  const { frequency, damping } = entry;
  if (!(frequency > 0) || !Number.isFinite(frequency) || !Number.isFinite(damping)) refuse();
  const root = Math.sqrt(Math.abs(1 - damping)) * Math.sqrt(Math.abs(1 + damping));
  if (Math.abs(damping) < 1) {
    const upper = inPlane({ re: -damping * frequency, im: frequency * root });
    return pair(upper.re, upper.im);
  }
  const fast = damping > 0 ? damping + root : damping - root;
  return [-frequency / fast, -frequency * fast].map((re) => inPlane({ re, im: 0 }));
}

function pair(re: number, im: number): Complex[] {
  const upper = Math.abs(im);
  return [
    { re: re + 0, im: upper },
    { re: re + 0, im: 0 - upper },
  ];
}

function sampledPole(s: Complex, period: number, refuse: () => never): Complex {
  const exponent = { re: s.re * period, im: s.im * period };
  if (!(period > 0) || !(exponent.re <= 700) || !(exponent.im <= Math.PI)) refuse();
  return complexExponential(exponent);
}
