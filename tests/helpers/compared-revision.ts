import type { DesignRevision } from "@/lib/schemas/design";
import type { ResponseFigures } from "@/lib/schemas/evidence";

export type States = readonly { name: string; axis: number | null; accepted: number }[];

/** A design of a small plant with everything refused that this does not look at. */
export function comparedRevision(
  name: string,
  number: number,
  states: States,
  poles: readonly [number, number, number][],
): DesignRevision {
  const refused = {
    state: "refused",
    code: "rank",
    data: {},
    title: "Not solved",
    sentence: "No reason.",
    nextStep: "None.",
  } as const;
  const signal = (s: States[number]) => ({ name: s.name, unit: "m", axis: s.axis, scale: null });
  return {
    ...{
      id: `${name} ${number}`,
      designId: name,
      designName: name,
      number,
      note: "",
      createdBy: null,
      createdAt: "2026-01-01T00:00:00Z",
    },
    ...{ plantId: "plant", plantName: "Plant", plantRevision: { id: "r", number: 1 }, outdated: false, cautions: [] },
    acceptance: { judgedBy: "plant", met: 0, of: 0, verdicts: [] },
    recipe: {
      ...{ version: 1, method: "weights", crossWeight: null, degreeOfStability: null },
      weights: { form: "deviations", states: states.map(({ accepted }) => accepted), inputs: [60] },
      observer: { kind: "none" },
      reference: { kind: "none" },
      test: { horizon: null, initialState: states.map(() => 0), inputDisturbance: [0] },
      reasons: { weights: `as ${name} needs` },
    },
    model: {
      timeBase: { kind: "continuous" },
      axes: [
        { name: "travel", tag: "y" },
        { name: "turn", tag: "t" },
      ],
      states: states.map(signal),
      inputs: [{ name: "F", unit: "N", axis: 0, scale: null, lower: null, upper: null }],
      ...{ outputs: [], disturbances: [], commanded: [], A: [], B: [], C: [], D: [], E: [], H: [], J: [] },
      operatingPoint: { states: [], inputs: [], outputs: [] },
    },
    evidence: {
      methodVersion: "1",
      ...{ gains: refused, reference: { state: "absent" }, observer: { state: "absent" }, responses: refused },
      poles: {
        state: "computed",
        value: poles.map(([re, im, mainState]) => ({
          pole: { re, im },
          naturalFrequency: null,
          damping: null,
          timeConstant: -1 / re,
          mainState,
        })),
      },
    },
  };
}

const y = { name: "y", axis: 0, accepted: 0.1 };
const t = { name: "t", axis: 1, accepted: 0.2 };
const rest = { final: 0, peak: 1, peakAt: null, overshoot: null, undershoot: null, rise: null };
const step = (source: number, settling: number): ResponseFigures["figures"][number] => ({
  ...{ loop: "full-state", source, outputs: [], effort: [] },
  commanded: [0, 1].map((index) => ({ ...rest, settling: index === source ? settling : null })),
});

export type Stepped = {
  settling: readonly [number, number];
  overshoot?: number;
  effort: number;
  limit?: number | null;
  unit?: string;
};

/** A design of a plant with two commanded quantities, stepped as told. */
export function steppedRevision(
  name: string,
  { settling, overshoot = 4, effort, limit = null, unit = "N" }: Stepped,
): DesignRevision {
  const bare = comparedRevision(name, 1, [y, t], [[-1, 0, 0]]);
  const [input] = bare.model.inputs;
  const commanded = [y, t].map((signal) => ({ name: signal.name, unit: "m", axis: signal.axis, amplitude: 0.01 }));
  const fullState = {
    ...{ worstSettling: Math.max(...settling), worstRise: null, worstOvershoot: overshoot },
    worstCrossPeak: { source: 0, signal: 1, peak: 0.3 },
    peakEffort: [{ peak: effort, overLimit: limit === null ? null : effort / limit }],
  };
  const figures = settling.map((seconds, source) => step(source, seconds));
  const responses = { state: "computed", value: { horizon: 5, figures, summary: { fullState, observer: null } } } as const;
  return {
    ...bare,
    model: { ...bare.model, inputs: [{ ...input, unit }], commanded },
    evidence: { ...bare.evidence, responses },
  };
}
