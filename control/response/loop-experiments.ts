import { type Drive, inputDrive, type LoopDynamics, startDrive } from "./loop-dynamics";

/** What the loop is put through: steps of each commanded quantity, a start away from rest, a step at each input. */
export type Experiments = {
  /** One per commanded quantity; zero leaves it out. */
  readonly amplitudes: readonly number[];
  /** n numbers, all zero to leave it out */
  readonly initialState: readonly number[];
  /** One per input; zero leaves it out. */
  readonly inputDisturbance: readonly number[];
};

export type Experiment = {
  readonly kind: "step" | "initial" | "disturbance";
  readonly source: number;
  readonly amplitude: number;
  readonly drive: Drive;
};

/** Experiments on one loop, in the order in which their records are stored; no steps without references. */
export function loopExperiments(
  dynamics: LoopDynamics,
  { amplitudes, initialState, inputDisturbance }: Experiments,
): Experiment[] {
  const { references, disturbances } = dynamics.loop;
  const experiments: Experiment[] = [];
  for (let source = 0; source < references; source++) {
    const amplitude = amplitudes[source];
    if (amplitude !== 0) experiments.push({ kind: "step", source, amplitude, drive: inputDrive(dynamics, source, amplitude) });
  }
  if (initialState.some((entry) => entry !== 0)) {
    experiments.push({ kind: "initial", source: 0, amplitude: 1, drive: startDrive(dynamics, initialState) });
  }
  for (let source = 0; source < disturbances; source++) {
    const amplitude = inputDisturbance[source];
    if (amplitude === 0) continue;
    experiments.push({ kind: "disturbance", source, amplitude, drive: inputDrive(dynamics, references + source, amplitude) });
  }
  return experiments;
}
