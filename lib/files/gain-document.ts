import type { GainEvidence, ObserverEvidence, ReferenceEvidence } from "@/control/design/evidence";
import type { PlantModel, Rows, TimeBase } from "@/control/plant/model";
import { CAUTIONS } from "@/control/words/cautions";
import { describeLaw, describeObserverLaw, describeTimeBase } from "@/control/words/describe-law";

/** A computed design revision, as much of it as leaves the product with its gain. */
export type GainSource = {
  readonly plant: { readonly name: string; readonly revision: number };
  readonly design: { readonly name: string; readonly revision: number };
  readonly methodVersion: string;
  readonly model: PlantModel;
  readonly gains: GainEvidence;
  /** `null` where the recipe asks for none, or where it was refused. */
  readonly reference: ReferenceEvidence | null;
  readonly observer: ObserverEvidence | null;
};

type Named = { readonly name: string; readonly unit: string };
/** A matrix with what stands for its rows and columns, in order. */
export type NamedMatrix = {
  readonly symbol: string;
  readonly meaning: string;
  readonly rows: readonly Named[];
  readonly columns: readonly Named[];
  readonly entries: Rows;
};

export type GainDocument = {
  readonly kind: "gain";
  readonly version: 1;
  readonly plant: GainSource["plant"];
  readonly design: GainSource["design"];
  readonly law: string;
  readonly timeBase: TimeBase;
  readonly timeBaseInWords: string;
  readonly method: string;
  readonly methodVersion: string;
  readonly residual: number;
  readonly bound: number;
  readonly errorBound: number | null;
  readonly operatingPoint: readonly (Named & { readonly symbol: string; readonly value: number })[];
  readonly matrices: readonly NamedMatrix[];
  readonly observerLaw: string | null;
  readonly cautions: readonly string[];
};

/** Everything an implementer needs beside the numbers, so that no sign, order, unit or time base has to be guessed. */
export function gainDocument(source: GainSource): GainDocument {
  const { plant, design, methodVersion, model, gains, reference, observer } = source;
  return {
    kind: "gain",
    version: 1,
    plant,
    design,
    law: describeLaw(reference !== null, observer !== null),
    timeBase: model.timeBase,
    timeBaseInWords: describeTimeBase(model.timeBase),
    method: gains.method,
    methodVersion,
    residual: gains.residual,
    bound: gains.bound,
    errorBound: gains.errorBound,
    operatingPoint: operatingPoint(model),
    matrices: [...gainMatrices(source), ...(observer ? observerMatrices(observer, model) : [])],
    observerLaw: observer && describeObserverLaw(observer.kind, model.timeBase),
    cautions: CAUTIONS,
  };
}

function operatingPoint({ states, inputs, outputs, operatingPoint: at }: PlantModel): GainDocument["operatingPoint"] {
  const list = (symbol: string, signals: readonly Named[], values: readonly number[]) =>
    signals.map((signal, index) => ({ symbol, ...named(signal), value: values[index] ?? 0 }));
  return [...list("x0", states, at.states), ...list("u0", inputs, at.inputs), ...list("y0", outputs, at.outputs)];
}

const named = ({ name, unit }: Named): Named => ({ name, unit });

function gainMatrices({ model, gains, reference }: GainSource): NamedMatrix[] {
  const rows = model.inputs.map(named);
  const K = { symbol: "K", meaning: "state feedback gain", rows, columns: model.states.map(named), entries: gains.K };
  if (!reference) return [K];
  const columns = model.commanded.map(named);
  return [K, { symbol: "F", meaning: "reference gain", rows, columns, entries: reference.F }];
}

function observerMatrices(observer: ObserverEvidence, model: PlantModel): NamedMatrix[] {
  const [x, u, y] = [model.states, model.inputs, model.outputs].map((signals) => signals.map(named));
  if (observer.kind === "full") return [{ symbol: "L", meaning: "observer gain", rows: x, columns: y, entries: observer.L }];
  // Mixtures of states, in units of nobody but this observer.
  const w = Array.from({ length: observer.order }, (_, index) => ({ name: `w${index + 1}`, unit: "own" }));
  return [
    { symbol: "Fw", meaning: "observer dynamics", rows: w, columns: w, entries: observer.Fw },
    { symbol: "Fy", meaning: "observer, measured outputs", rows: w, columns: y, entries: observer.Fy },
    { symbol: "Fu", meaning: "observer, inputs", rows: w, columns: u, entries: observer.Fu },
    { symbol: "Gw", meaning: "estimate from the observer", rows: x, columns: w, entries: observer.Gw },
    { symbol: "Gy", meaning: "estimate from the measured outputs", rows: x, columns: y, entries: observer.Gy },
  ];
}
