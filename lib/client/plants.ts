import type { Criteria } from "../schemas/criteria";
import type { ChecksReply } from "../schemas/evidence";
import type {
  AddPlantRevision,
  CreatePlant,
  Plant,
  PlantContent,
  PlantDifference,
  PlantQuery,
  PlantRevision,
  PlantRevisionEntry,
  PlantSummary,
} from "../schemas/plant";
import { newKey, request } from "./request";

type Page<T> = { readonly items: T[]; readonly nextCursor: string | null };
const plantPath = (plantId: string) => `/api/v1/plants/${plantId}`;

export const plantKeys = {
  all: ["plants"] as const,
  list: (query: Partial<PlantQuery>) => ["plants", "list", query] as const,
  detail: (plantId: string) => ["plants", plantId] as const,
  revisions: (plantId: string) => ["plants", plantId, "revisions"] as const,
  revision: (plantId: string, revisionId: string) => ["plants", plantId, "revisions", revisionId] as const,
  checks: (plantId: string, revisionId: string) => ["plants", plantId, "revisions", revisionId, "checks"] as const,
  difference: (plantId: string, from: string, to: string) => ["plants", plantId, "difference", from, to] as const,
};

export const fetchPlants = async (query: Partial<PlantQuery>, signal?: AbortSignal) =>
  (await request<Page<PlantSummary>>("/api/v1/plants", { query, signal })).data;
export const fetchPlant = async (plantId: string, signal?: AbortSignal) =>
  (await request<Plant>(plantPath(plantId), { signal })).data;
export const fetchPlantRevisions = async (plantId: string, query: { cursor?: string }, signal?: AbortSignal) =>
  (await request<Page<PlantRevisionEntry>>(`${plantPath(plantId)}/revisions`, { query, signal })).data;
export const fetchPlantRevision = async (plantId: string, revisionId: string, signal?: AbortSignal) =>
  (await request<PlantRevision>(`${plantPath(plantId)}/revisions/${revisionId}`, { signal })).data;
export const fetchRevisionChecks = async (plantId: string, revisionId: string, signal?: AbortSignal) =>
  (await request<ChecksReply>(`${plantPath(plantId)}/revisions/${revisionId}/checks`, { signal })).data;
export const fetchDifference = async (plantId: string, from: string, to: string, signal?: AbortSignal) =>
  (await request<PlantDifference>(`${plantPath(plantId)}/difference`, { query: { from, to }, signal })).data;

/** Checks of a plant that need not be saved. */
export const checkContent = async (content: PlantContent, signal?: AbortSignal) =>
  (await request<ChecksReply>("/api/v1/checks", { method: "POST", body: { content }, signal })).data;

/** `key`: the same again when the same create is sent again, so that a repeated click makes one plant. */
export const createPlant = async (body: CreatePlant, key = newKey()) =>
  (await request<Plant>("/api/v1/plants", { method: "POST", body, key })).data;
export const duplicatePlant = async (plantId: string, body: { name: string; revisionId?: string }, key = newKey()) =>
  (await request<Plant>(`${plantPath(plantId)}/duplicate`, { method: "POST", body, key })).data;

/** Each change carries the version it started from. */
export const renamePlant = async (plantId: string, version: number, name: string) =>
  (await request<Plant>(plantPath(plantId), { method: "PATCH", body: { name }, version })).data;
export const archivePlant = async (plantId: string, version: number, archived: boolean) =>
  (await request<Plant>(`${plantPath(plantId)}/archive`, { method: "POST", body: { archived }, version })).data;
export const setCriteria = async (plantId: string, version: number, criteria: Criteria) =>
  (await request<Plant>(`${plantPath(plantId)}/criteria`, { method: "PUT", body: { criteria }, version })).data;
export const addPlantRevision = async (plantId: string, version: number, body: AddPlantRevision) =>
  (await request<Plant>(`${plantPath(plantId)}/revisions`, { method: "POST", body, version })).data;
