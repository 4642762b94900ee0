import type { Draft, FoundDraft, KeepDraft, KeptDraft } from "../schemas/draft";
import { newKey, noConnection, request } from "./request";

/** Whose draft: a design, an older revision of one, or for a new design the plant itself. */
export type DraftSubject = { readonly plantId: string; readonly subjectId: string };
const pathOf = ({ plantId, subjectId }: DraftSubject) => `/api/v1/plants/${plantId}/drafts/${subjectId}`;

/** A write that hangs keeps the next one waiting; after this long it counts as lost. */
const GIVE_UP_AFTER_MS = 10_000;

/** A new id, also where `randomUUID` is missing, on plain http outside loopback. */
export function newMark(): string {
  const hex = newKey();
  return `${hex.slice(0, 8)}-${hex.slice(8, 12)}-4${hex.slice(13, 16)}-a${hex.slice(17, 20)}-${hex.slice(20)}`;
}

export const fetchDraft = async (subject: DraftSubject): Promise<Draft | null> =>
  (await inTime((signal) => request<FoundDraft>(pathOf(subject), { signal }))).data.draft;

export const putDraft = async (subject: DraftSubject, body: KeepDraft): Promise<KeptDraft> =>
  (await inTime((signal) => request<KeptDraft>(pathOf(subject), { method: "PUT", body, signal }))).data;

/** Goes through even where the page is closed at once. */
export const deleteDraft = async (subject: DraftSubject, marks: readonly string[]): Promise<void> => {
  const query = { marks: marks.join(",") };
  await inTime((signal) => request(pathOf(subject), { method: "DELETE", query, signal, keepalive: true }));
};

async function inTime<T>(send: (signal: AbortSignal) => Promise<T>): Promise<T> {
  const signal = AbortSignal.timeout(GIVE_UP_AFTER_MS);
  try {
    return await send(signal);
  } catch (error) {
    throw signal.aborted ? noConnection() : error;
  }
}
