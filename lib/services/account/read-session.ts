import "server-only";
import { asVisitor } from "@/db/client";
import { findLiveSession, type SessionKey, touchSession } from "@/db/queries/sessions";
import type { Context, Person } from "../context";
import { SESSION_SECONDS } from "./session-times";

/** `context` is null while the person belongs to no team, or was removed from the one they worked in. */
export type LiveSession = { readonly person: Person; readonly context: Context | null };

/** Asked on every request: a revoked session, an ended membership or a new role counts from the next request on. */
export async function readSession(key: SessionKey, requestId: string): Promise<LiveSession | null> {
  return asVisitor(
    async (tx) => {
      const live = await findLiveSession(tx, key, SESSION_SECONDS.idle);
      if (!live) return null;
      if (live.stale) await touchSession(tx, key);
      const { name, email, teamId, role } = live;
      const person: Person = { ...key, name, email, requestId };
      const context: Context | null = teamId && role ? { teamId, userId: key.userId, role, scope: "write", requestId } : null;
      return { person, context };
    },
    { user_id: key.userId },
  );
}
