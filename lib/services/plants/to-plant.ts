import "server-only";
import type { PlantRevisionEntryRow, PlantRevisionRow } from "@/db/queries/plant-revisions";
import type { PlantRow, PlantSummaryRow } from "@/db/queries/plants";
import type { Plant, PlantRevision, PlantRevisionEntry, PlantSummary } from "@/lib/schemas/plant";

/** Only the fields we mean to show. */
export function toPlantSummary(row: PlantSummaryRow): PlantSummary {
  return {
    id: row.id,
    name: row.name,
    version: row.version,
    currentRevision: { id: row.revisionId, number: row.revisionNumber },
    axes: [...row.axes],
    order: row.order,
    inputCount: row.inputCount,
    outputCount: row.outputCount,
    timeBase: row.timeBase,
    designCount: row.designCount,
    archivedAt: row.archivedAt?.toISOString() ?? null,
    createdAt: row.createdAt.toISOString(),
    updatedAt: row.updatedAt.toISOString(),
  };
}

export const toPlant = (row: PlantRow): Plant => ({ ...toPlantSummary(row), criteria: row.criteria });

export function toRevisionEntry(row: PlantRevisionEntryRow): PlantRevisionEntry {
  const { id, plantId, plantName, number, note, createdBy } = row;
  return { id, plantId, plantName, number, note, createdBy, createdAt: row.createdAt.toISOString() };
}

export function toRevision(row: PlantRevisionRow): PlantRevision {
  return {
    ...toRevisionEntry(row),
    content: row.content as PlantRevision["content"],
    model: row.model as PlantRevision["model"],
  };
}
