import "server-only";
import { asVisitor } from "@/db/client";
import { revokeSession, revokeSessionsOf, type SessionKey } from "@/db/queries/sessions";
import type { Person } from "../context";

/** Signing out: a copied cookie is worth nothing from now on. */
export async function endSession(key: SessionKey): Promise<void> {
  await asVisitor((tx) => revokeSession(tx, key), { user_id: key.userId });
}

/** Sign-out everywhere, or everywhere else. Gives the number of sessions that ended. */
export async function endSessions(person: Person, which: "all" | "others"): Promise<number> {
  const except = which === "others" ? person.sessionId : null;
  return asVisitor((tx) => revokeSessionsOf(tx, person.userId, except), { user_id: person.userId });
}
