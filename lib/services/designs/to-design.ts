import "server-only";
import { CAUTIONS } from "@/control/words/cautions";
import type { DesignRevisionEntryRow, DesignRevisionRow } from "@/db/queries/design-revisions";
import type { DesignRow } from "@/db/queries/designs";
import type { EvidenceRow } from "@/db/queries/evidence";
import type { DesignRevision, DesignRevisionEntry, DesignSummary } from "@/lib/schemas/design";
import { evidenceReply } from "./evidence-reply";
import { toAcceptance } from "./to-acceptance";

/** Only the fields we mean to show. */
export function toDesignSummary(row: DesignRow): DesignSummary {
  const shown = row.summary?.observer ?? row.summary?.fullState ?? null;
  return {
    id: row.id,
    plantId: row.plantId,
    name: row.name,
    version: row.version,
    method: row.method,
    observer: row.observer,
    currentRevision: { id: row.revisionId, number: row.revisionNumber },
    plantRevision: { id: row.plantRevisionId, number: row.plantRevisionNumber },
    outdated: row.plantRevisionNumber !== row.newestPlantRevision,
    summary: shown && { ...shown, peakEffort: [...shown.peakEffort] },
    archivedAt: row.archivedAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}

export function toDesignRevisionEntry(row: DesignRevisionEntryRow): DesignRevisionEntry {
  const { id, designId, number, note, createdBy } = row;
  return { id, designId, number, note, createdBy, createdAt: row.createdAt.toISOString() };
}

export function toDesignRevision(row: DesignRevisionRow, rows: readonly EvidenceRow[]): DesignRevision {
  const { designName, plantId, plantName, plantRevisionId, plantRevisionNumber, newestPlantRevision } = row;
  const evidence = evidenceReply(rows, row.methodVersion, row.model);
  return {
    ...toDesignRevisionEntry(row),
    ...{ designName, plantId, plantName },
    plantRevision: { id: plantRevisionId, number: plantRevisionNumber },
    outdated: plantRevisionNumber !== newestPlantRevision,
    recipe: row.recipe as DesignRevision["recipe"],
    model: row.model as DesignRevision["model"],
    evidence,
    acceptance: toAcceptance(row.criteria, "plant", { evidence, model: row.model }),
    cautions: [...CAUTIONS],
  };
}
