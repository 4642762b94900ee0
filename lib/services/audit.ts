import "server-only";
import type { Db } from "@/db/client";
import { insertAuditEvent } from "@/db/queries/audit-events";
import type { Context } from "./context";

export type Subject = { readonly type: string; readonly id: string | null; readonly revision?: number };
type Actor = Pick<Context, "teamId" | "userId" | "requestId" | "tokenId">;

/** Part of the change itself: it stands or falls with the transaction. `kind` is `subject.past-tense`, such as `plant.renamed`. */
export async function recordEvent(tx: Db, actor: Actor, kind: string, subject: Subject, data: Record<string, unknown> = {}) {
  await insertAuditEvent(tx, {
    teamId: actor.teamId,
    actorId: actor.userId,
    kind,
    subjectType: subject.type,
    subjectId: subject.id,
    revision: subject.revision ?? null,
    requestId: actor.requestId,
    data: actor.tokenId === undefined ? data : { ...data, tokenId: actor.tokenId },
  });
}
