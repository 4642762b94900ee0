import "server-only";
import type { Evidence, ResponseEvidence } from "@/control/design/evidence";
import type { NumericalErrorCode } from "@/control/errors";
import type { PlantModel } from "@/control/plant/model";
import type { Part } from "@/control/plant/report";
import { explainRefusal } from "@/control/words/explain-refusal";
import type { EvidenceRow } from "@/db/queries/evidence";
import type { EvidenceReply, Refusal } from "@/lib/schemas/evidence";

/** The figures of the responses without their curves, which are stored and fetched apart. */
export function withoutCurves({ horizon, figures, summary }: ResponseEvidence) {
  return { horizon, figures, summary };
}

const PARTS = ["gains", "poles", "reference", "observer", "responses"] as const;

/** One row per part; an absent part has none. */
export function evidenceRows(evidence: Evidence): EvidenceRow[] {
  return PARTS.flatMap((part): EvidenceRow[] => {
    const found = evidence[part];
    if (found.state === "absent") return [];
    if (found.state === "refused") return [{ part, state: "refused", content: { code: found.code, data: found.data } }];
    const value = part === "responses" ? withoutCurves(found.value as ResponseEvidence) : found.value;
    return [{ part, state: "computed", content: value }];
  });
}

export function inWords(refused: { code: string; data: Readonly<Record<string, unknown>> }, model: PlantModel): Refusal {
  const { code, data } = refused;
  return { state: "refused", code, data: { ...data }, ...explainRefusal(code as NumericalErrorCode, data, model) };
}

/** Same part, a refusal put into the plant's own signal names. */
export function partInWords<T>(part: Part<T>, model: PlantModel): { state: "computed"; value: T } | Refusal {
  return part.state === "computed" ? part : inWords(part, model);
}

/** Stored rows as they are shown; the reply schema checks every field on its way out. */
export function evidenceReply(rows: readonly EvidenceRow[], methodVersion: string, model: PlantModel): EvidenceReply {
  const part = (name: (typeof PARTS)[number]) => {
    const row = rows.find((candidate) => candidate.part === name);
    if (!row) return { state: "absent" };
    return row.state === "computed" ? { state: "computed", value: row.content } : inWords(row.content as Refusal, model);
  };
  const reply = Object.fromEntries(PARTS.map((name) => [name, part(name)]));
  return { methodVersion, ...reply } as EvidenceReply;
}
