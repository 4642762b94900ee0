import type { PlantModel } from "../plant/model";
import type { InputRoom } from "../response/loop-figures";

/** Way from the operating point to each limit of each input. */
export function inputRoom({ inputs, operatingPoint }: PlantModel): InputRoom[] {
  return inputs.map(({ lower, upper }, j) => {
    const held = operatingPoint.inputs[j] ?? 0;
    return { up: upper === null ? null : upper - held, down: lower === null ? null : held - lower };
  });
}
