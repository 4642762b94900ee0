import type { PlantModel, Rows } from "@/control/plant/model";

type Parts = { readonly A: Rows; readonly B: Rows; readonly C: Rows; readonly D?: Rows };

/**
 * A plant from its matrices alone: states x1 …, inputs u1 …, outputs y1 …, the first outputs commanded,
 * no scales declared, everything on one axis; `changes` replace whole fields.
 */
export function smallPlant({ A, B, C, D }: Parts, changes: Partial<PlantModel> = {}): PlantModel {
  const m = B[0].length;
  const commanded = C.slice(0, m);
  const zeros = (rows: number, columns: number) => Array.from({ length: rows }, () => new Array<number>(columns).fill(0));
  const named = (letter: string, count: number) =>
    Array.from({ length: count }, (_, i) => ({ name: `${letter}${i + 1}`, unit: "m", axis: 0, scale: null }));
  return {
    timeBase: { kind: "continuous" },
    axes: [{ name: "only", tag: "O" }],
    states: named("x", A.length),
    inputs: named("u", m).map((input) => ({ ...input, lower: null, upper: null })),
    outputs: named("y", C.length),
    disturbances: [],
    commanded: commanded.map((_, i) => ({ name: `y${i + 1}`, unit: "m", axis: 0, amplitude: 1 })),
    A,
    B,
    C,
    D: D ?? zeros(C.length, m),
    E: A.map(() => []),
    H: commanded,
    J: zeros(commanded.length, m),
    operatingPoint: { states: A.map(() => 0), inputs: new Array<number>(m).fill(0), outputs: C.map(() => 0) },
    ...changes,
  };
}
