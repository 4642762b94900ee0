import type { DesignQuery } from "../schemas/design";
import type { CreateTemplate, StartFromTemplate, Template, TemplateSummary } from "../schemas/template";
import { newKey, request } from "./request";

type Page<T> = { readonly items: T[]; readonly nextCursor: string | null };

export const templateKeys = {
  all: ["templates"] as const,
  list: (query: Partial<DesignQuery>) => ["templates", "list", query] as const,
  detail: (templateId: string) => ["templates", templateId] as const,
};

export const fetchTemplates = async (query: Partial<DesignQuery>, signal?: AbortSignal) =>
  (await request<Page<TemplateSummary>>("/api/v1/templates", { query, signal })).data;
export const fetchTemplate = async (templateId: string, signal?: AbortSignal) =>
  (await request<Template>(`/api/v1/templates/${templateId}`, { signal })).data;

/** `key`: the same again when the same create is sent again. */
export const publishTemplate = async (body: CreateTemplate, key = newKey()) =>
  (await request<Template>("/api/v1/templates", { method: "POST", body, key })).data;
export const startFromTemplate = async (templateId: string, body: StartFromTemplate, key = newKey()) =>
  (await request<{ plantId: string; designId: string }>(`/api/v1/templates/${templateId}/start`, { method: "POST", body, key }))
    .data;
export const archiveTemplate = async (templateId: string, version: number, archived: boolean) =>
  (await request<Template>(`/api/v1/templates/${templateId}/archive`, { method: "POST", body: { archived }, version })).data;
