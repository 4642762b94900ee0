import type { DesignRevision } from "@/lib/schemas/design";

/** Parts of the evidence as the service sends them. */
export type EvidenceReply = DesignRevision["evidence"];
type Computed<T> = Extract<T, { state: "computed" }> extends { value: infer V } ? V : never;

export type GainsReply = Computed<EvidenceReply["gains"]>;
export type PolesReply = Computed<EvidenceReply["poles"]>;
export type ObserverReply = Computed<EvidenceReply["observer"]>;
export type ReferenceReply = Computed<EvidenceReply["reference"]>;
export type ResponsesReply = Computed<EvidenceReply["responses"]>;
export type StepFiguresReply = ResponsesReply["figures"][number];
export type RefusalReply = Extract<EvidenceReply["gains"], { state: "refused" }>;

/** A part's value, or null where it was refused or not asked for. */
export function computed<T extends { readonly state: string }>(part: T): Computed<T> | null {
  return part.state === "computed" ? (part as T & { value: Computed<T> }).value : null;
}
