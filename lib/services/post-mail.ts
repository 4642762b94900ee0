import "server-only";
import { randomUUID } from "node:crypto";
import type { Db } from "@/db/client";
import { enqueueMail, insertMail, type Mail } from "@/db/queries/outbox";

/** Part of the change that causes it: no mail about what did not happen. `teamId` null: to a person as such. */
export async function postMail(tx: Db, teamId: string | null, mail: Mail): Promise<void> {
  const id = randomUUID();
  await insertMail(tx, { ...mail, id, teamId });
  await enqueueMail(tx, id);
}
