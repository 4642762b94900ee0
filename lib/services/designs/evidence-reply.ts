import "server-only";
import type { Evidence, ResponseEvidence } from "@/control/design/evidence";
import type { PlantModel } from "@/control/plant/model";
import { inWords, withoutCurves } from "@/control/words/evidence-in-words";
import type { EvidenceRow } from "@/db/queries/evidence";
import type { EvidenceReply, Refusal } from "@/lib/schemas/evidence";

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
