import type { PoleEntry } from "../design/recipe";
import { NumericalError } from "../errors";

export type PrototypeSet = "bessel" | "itae-1953" | "itae" | "butterworth";
export const HIGHEST_PROTOTYPE_ORDER = 6;

/** A real pole, or a pair: its distance from the origin, with the damping of a pair; for a set of unit natural frequency. */
type Prototype = number | readonly [frequency: number, damping: number];

/** By order, from one. */
const PROTOTYPES: Readonly<Record<PrototypeSet, readonly (readonly Prototype[])[]>> = {
  bessel: [
    [1],
    [[1, 0.866025403784]],
    [0.941600026533, [1.030544545438, 0.723540179945]],
    [
      [0.944449808226, 0.957974461859],
      [1.058817516071, 0.620702965049],
    ],
    [0.926442077388, [0.959761595159, 0.887255359731], [1.08249898167, 0.545567205708]],
    [
      [0.928156550439, 0.979781570918],
      [0.977488555538, 0.818070126041],
      [1.102216948046, 0.488608601622],
    ],
  ],
  "itae-1953": [
    [1],
    [[1, 0.7]],
    [0.708099579084, [1.188373152887, 0.438372584564]],
    [
      [0.750605832583, 0.834016521121],
      [1.332257166932, 0.318243613395],
    ],
    [0.895502482857, [0.785282912706, 0.733289629084], [1.345675840133, 0.279717396687]],
    [
      [0.788798060217, 0.931334177032],
      [0.974584474938, 0.595648548162],
      [1.300812427145, 0.238201583656],
    ],
  ],
  itae: [
    [1],
    [[1, 0.7525]],
    [0.709377305416, [1.18730242507, 0.452548007943]],
    [
      [0.72389582155, 0.810370232086],
      [1.381414245297, 0.281867930934],
    ],
    [0.56042805304, [0.869674957197, 0.533173887845], [1.53597130509, 0.18854388388]],
    [
      [0.580644989971, 0.842519615893],
      [1.040823962018, 0.351956847248],
      [1.654672445304, 0.132938749595],
    ],
  ],
  butterworth: [
    [1],
    [[1, Math.SQRT1_2]],
    [1, [1, 0.5]],
    [
      [1, 0.923879532511],
      [1, 0.382683432365],
    ],
    [1, [1, 0.809016994375], [1, 0.309016994375]],
    [
      [1, 0.965925826289],
      [1, Math.SQRT1_2],
      [1, 0.258819045103],
    ],
  ],
};

/**
 * A published set of poles, as entries that read as damping and frequency or as a time constant, for either time base.
 *
 * Shapes    order 1 to 6 → entries for that many poles
 * Units     frequency in rad/s: the geometric mean of the poles' distances from the origin
 * Throws    bad-option: an order without a published set, or a frequency that is not above zero
 * Accuracy  12 digits of each pole of the set as it is defined below
 * Source    Bessel: Thomson 1949, poles of the reverse Bessel polynomials scaled to unit geometric mean; Butterworth 1930;
 *           itae-1953: Graham & Lathrop, AIEE Transactions 72, 1953; itae: the same criterion minimised anew, whose optimum the
 *           coefficients of 1953 miss
 */
export function prototypePoles(set: PrototypeSet, order: number, frequency: number): PoleEntry[] {
  const prototypes = PROTOTYPES[set][order - 1];
  if (!prototypes) throw new NumericalError("bad-option", { option: "order", given: order });
  if (!(frequency > 0)) throw new NumericalError("bad-option", { option: "frequency", given: frequency });
  return prototypes.map((prototype) =>
    typeof prototype === "number"
      ? { kind: "time-constant", seconds: 1 / (prototype * frequency) }
      : { kind: "damping", frequency: prototype[0] * frequency, damping: prototype[1] },
  );
}
