import "server-only";
import type { listTemplates, TemplateRow } from "@/db/queries/templates";
import type { Template, TemplateSummary } from "@/lib/schemas/template";

type SummaryRow = Awaited<ReturnType<typeof listTemplates>>[number];

/** Only the fields we mean to show. */
export function toTemplateSummary(row: Omit<SummaryRow, "sortValue">): TemplateSummary {
  const { id, name, description, version, openParameterCount, order } = row;
  const archivedAt = row.archivedAt?.toISOString() ?? null;
  return { id, name, description, version, openParameterCount, order, archivedAt, createdAt: row.createdAt.toISOString() };
}

export function toTemplate(row: TemplateRow): Template {
  return { ...toTemplateSummary(row), content: row.content };
}
