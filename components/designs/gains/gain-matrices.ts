import type { PlantModel, Rows } from "@/control/plant/model";
import type { Header } from "../../matrix/header";
import { computed, type EvidenceReply, type ObserverReply } from "../evidence/figures-reply";
import { headersOf } from "../signal-headers";

/** A matrix of the control law with what stands for its rows and columns, in order. */
export type GainMatrix = {
  readonly symbol: string;
  readonly meaning: string;
  readonly rows: readonly Header[];
  readonly columns: readonly Header[];
  readonly values: Rows;
};

/** Every matrix an implementer needs: K, F, and the observer's. */
export function gainMatrices(evidence: EvidenceReply, model: PlantModel): GainMatrix[] {
  const gains = computed(evidence.gains);
  if (!gains) return [];
  const reference = computed(evidence.reference);
  const observer = computed(evidence.observer);
  const [x, u] = [headersOf(model.states), headersOf(model.inputs)];
  const r = headersOf(model.commanded.map((signal) => ({ ...signal, scale: Math.abs(signal.amplitude) || null })));
  return [
    { symbol: "K", meaning: "state feedback", rows: u, columns: x, values: gains.K },
    ...(reference ? [{ symbol: "F", meaning: "reference", rows: u, columns: r, values: reference.F }] : []),
    ...(observer ? observerMatrices(observer, model) : []),
  ];
}

function observerMatrices(observer: ObserverReply, model: PlantModel): GainMatrix[] {
  const [x, u, y] = [headersOf(model.states), headersOf(model.inputs), headersOf(model.outputs)];
  if (observer.kind === "full") return [{ symbol: "L", meaning: "observer", rows: x, columns: y, values: observer.L }];
  const w = Array.from({ length: observer.order }, (_, index): Header => ({ label: `w${index + 1}`, axis: null }));
  return [
    { symbol: "Fw", meaning: "observer dynamics", rows: w, columns: w, values: observer.Fw },
    { symbol: "Fy", meaning: "observer, measured outputs", rows: w, columns: y, values: observer.Fy },
    { symbol: "Fu", meaning: "observer, inputs", rows: w, columns: u, values: observer.Fu },
    { symbol: "Gw", meaning: "estimate from the observer", rows: x, columns: w, values: observer.Gw },
    { symbol: "Gy", meaning: "estimate from the outputs", rows: x, columns: y, values: observer.Gy },
  ].filter(({ rows, columns }) => rows.length > 0 && columns.length > 0);
}
