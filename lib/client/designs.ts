import type { Comparison, SaveComparison } from "../schemas/comparison";
import type {
  AddDesignRevision,
  Computation,
  Compute,
  CreateDesign,
  DesignQuery,
  DesignRevision,
  DesignRevisionEntry,
  DesignSummary,
} from "../schemas/design";
import type { ResponseCurves } from "../schemas/evidence";
import { newKey, request } from "./request";

type Page<T> = { readonly items: T[]; readonly nextCursor: string | null };
const designPath = (designId: string) => `/api/v1/designs/${designId}`;

export type CurveQuery = {
  readonly kind: ResponseCurves["kind"];
  readonly loop: ResponseCurves["loop"] | "both";
  /** One commanded quantity or input only. */
  readonly source?: number;
  readonly signals: readonly ResponseCurves["signals"][number]["role"][];
};

export const designKeys = {
  list: (plantId: string, query: Partial<DesignQuery> = {}) => ["plants", plantId, "designs", query] as const,
  detail: (designId: string) => ["designs", designId] as const,
  revisions: (designId: string) => ["designs", designId, "revisions"] as const,
  revision: (revisionId: string) => ["design-revisions", revisionId] as const,
  curves: (revisionId: string, query: CurveQuery) => ["design-revisions", revisionId, "responses", query] as const,
  comparisons: (plantId: string) => ["plants", plantId, "comparisons"] as const,
};

export const fetchDesigns = async (plantId: string, query: Partial<DesignQuery> = {}, signal?: AbortSignal) =>
  (await request<Page<DesignSummary>>(`/api/v1/plants/${plantId}/designs`, { query, signal })).data;
export const fetchDesign = async (designId: string, signal?: AbortSignal) =>
  (await request<DesignSummary>(designPath(designId), { signal })).data;
export const fetchDesignRevisions = async (designId: string, query: { cursor?: string }, signal?: AbortSignal) =>
  (await request<Page<DesignRevisionEntry>>(`${designPath(designId)}/revisions`, { query, signal })).data;
export const fetchDesignRevision = async (revisionId: string, signal?: AbortSignal) =>
  (await request<DesignRevision>(`/api/v1/design-revisions/${revisionId}`, { signal })).data;
export const fetchCurves = async (revisionId: string, { kind, loop, source, signals }: CurveQuery, signal?: AbortSignal) =>
  (
    await request<{ items: ResponseCurves[] }>(`/api/v1/design-revisions/${revisionId}/responses`, {
      query: { kind, loop, source, signals: signals.join(",") },
      signal,
    })
  ).data.items;
/** Address of a download; the browser fetches it itself. */
export const gainFileAddress = (revisionId: string, format: "csv" | "json") =>
  `/api/v1/design-revisions/${revisionId}/gains?format=${format}`;
export const comparisonFileAddress = (plantId: string, designRevisionIds: readonly string[]) =>
  `/api/v1/plants/${plantId}/side-by-side?designs=${designRevisionIds.join(",")}&format=csv`;

/** Computes without storing. */
export const compute = async (body: Compute, signal?: AbortSignal) =>
  (await request<Computation>("/api/v1/computations", { method: "POST", body, signal })).data;

/** `key`: the same again when the same create is sent again, so that a repeated click makes one design. */
export const createDesign = async (plantId: string, body: CreateDesign, key = newKey()) =>
  (await request<DesignSummary>(`/api/v1/plants/${plantId}/designs`, { method: "POST", body, key })).data;
export const duplicateDesign = async (designId: string, name: string, key = newKey()) =>
  (await request<DesignSummary>(`${designPath(designId)}/duplicate`, { method: "POST", body: { name }, key })).data;

/** Each change carries the version it started from. */
export const renameDesign = async (designId: string, version: number, name: string) =>
  (await request<DesignSummary>(designPath(designId), { method: "PATCH", body: { name }, version })).data;
export const archiveDesign = async (designId: string, version: number, archived: boolean) =>
  (await request<DesignSummary>(`${designPath(designId)}/archive`, { method: "POST", body: { archived }, version })).data;
export const addDesignRevision = async (designId: string, version: number, body: AddDesignRevision) =>
  (await request<DesignSummary>(`${designPath(designId)}/revisions`, { method: "POST", body, version })).data;

export const fetchComparisons = async (plantId: string, signal?: AbortSignal) =>
  (await request<Page<Comparison>>("/api/v1/comparisons", { query: { plantId }, signal })).data;
export const saveComparison = async (body: SaveComparison, key = newKey()) =>
  (await request<Comparison>("/api/v1/comparisons", { method: "POST", body, key })).data;
export const archiveComparison = async (comparisonId: string, version: number) =>
  (await request<Comparison>(`/api/v1/comparisons/${comparisonId}`, { method: "DELETE", version })).data;
